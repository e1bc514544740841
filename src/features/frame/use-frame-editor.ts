import { useEffect, useRef, useState } from "react";
import type { AreaVersion } from "#shared/api/area.ts";
import type { FrameSpec } from "#shared/api/frame.ts";
import { usePlane } from "../../map/frame-ground.ts";
import type { PlaneReference } from "../../workers/frame-preview-work.ts";
import { readSettings, specOf, startSettings, type FrameSettings } from "./frame-settings.ts";
import { type DraftNow, draftMeanwhile, useFramePreview, useSaveDraft, type SeenDraft } from "./queries.ts";

const SAVE_AFTER_MS = 700;

interface EditorStart {
  readonly surveyId: string;
  /** The newest boundary; a frame is always laid over it. */
  readonly area: AreaVersion;
  /** The draft or version to begin with. */
  readonly from: FrameSpec | null;
  /** Whether `from` is the draft that is kept already. */
  readonly isKept: boolean;
  readonly seenRef: SeenDraft;
}

/** Keeps the draft a moment after the last change, and at once when the page is left before that. */
function useAutosave(
  { surveyId, seenRef }: Pick<EditorStart, "surveyId" | "seenRef">,
  spec: FrameSpec | null,
  keptAtStart: string | null,
  active: boolean,
) {
  const save = useSaveDraft(surveyId, seenRef);
  const { mutate } = save;
  const [kept, setKept] = useState(keptAtStart);
  const pending = useRef<FrameSpec | null>(null);
  const json = spec === null ? null : JSON.stringify(spec);
  // Another planner's draft is there: nothing is sent before somebody has looked at both.
  const refused = draftMeanwhile(save.error) !== undefined;
  useEffect(() => {
    pending.current = null;
    if (!active || refused || json === null || json === kept) return undefined;
    const due = JSON.parse(json) as FrameSpec;
    pending.current = due;
    const timer = setTimeout(() => {
      pending.current = null;
      mutate(due, { onSuccess: () => setKept(json) });
    }, SAVE_AFTER_MS);
    return () => clearTimeout(timer);
  }, [active, refused, json, kept, mutate]);
  useEffect(
    () => () => {
      if (pending.current !== null) mutate(pending.current);
    },
    [mutate],
  );
  return {
    error: save.error,
    again: () => (spec === null ? undefined : mutate(spec)),
    reset: save.reset,
    kept,
    setKept,
  };
}

/** What is being set, what it comes to, and keeping it. */
export function useFrameEditor({ surveyId, area, from, isKept, seenRef }: EditorStart, sealing: boolean) {
  const [settings, setSettings] = useState(() => startSettings(area, from));
  const [touched, setTouched] = useState(from !== null && !isKept);
  const read = readSettings(settings);
  const spec = specOf(settings);
  const reference: PlaneReference | null =
    settings.epsg === null ? null : { surveyId, areaId: settings.areaId, epsg: settings.epsg, mayMake: true };
  const plane = usePlane(reference);
  const planeIsThere = plane.isSuccess && !plane.isPlaceholderData;
  const preview = useFramePreview(planeIsThere ? reference : null, read.cells);
  const keptAtStart = isKept && from !== null ? JSON.stringify(specOf(startSettings(area, from))) : null;
  const saving = useAutosave({ surveyId, seenRef }, spec, keptAtStart, touched && planeIsThere && !sealing);
  const change = (part: Partial<FrameSettings>) => {
    setTouched(true);
    setSettings((before) => ({ ...before, ...part }));
  };
  return {
    ...{ settings, change, read, spec, plane, planeIsThere, preview, saving },
    /** What these settings began with, or were last kept as. */
    before: startSettings(area, saving.kept === null ? from : (JSON.parse(saving.kept) as FrameSpec)),
    /** Goes on with these settings from the draft that another planner keeps now, or where none is left (null). */
    goOn: (wanted: FrameSettings, now: DraftNow | null) => {
      seenRef.current = now?.draftSha256 ?? null;
      saving.reset();
      saving.setKept(now === null ? null : JSON.stringify(specOf(startSettings(area, now.spec))));
      setTouched(true);
      setSettings(wanted);
    },
  };
}

export type FrameEditorState = ReturnType<typeof useFrameEditor>;
