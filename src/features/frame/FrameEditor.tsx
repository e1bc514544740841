import { useRef, useState } from "react";
import type { AreaVersion } from "#shared/api/area.ts";
import type { FrameSpec, FrameVersion } from "#shared/api/frame.ts";
import type { CellAddress } from "#shared/frame/cell-spec.ts";
import { problemOf } from "../../api/problem-of.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { formatCount } from "../../components/ui/format.ts";
import { MapPage } from "../../components/ui/MapPage.tsx";
import { Progress } from "../../components/ui/Progress.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { FrameSettingsPanel } from "./FrameSettingsPanel.tsx";
import { FrameSheet } from "./FrameSheet.tsx";
import { FrameVersions } from "./FrameVersions.tsx";
import { DraftMeanwhile } from "./DraftMeanwhile.tsx";
import { draftMeanwhile, type SeenDraft, useSealFrame } from "./queries.ts";
import { useFrameEditor } from "./use-frame-editor.ts";

interface FrameEditorProps {
  readonly surveyId: string;
  readonly surveyName: string;
  /** What is counted, several of them. */
  readonly plural: string;
  readonly area: AreaVersion;
  readonly from: FrameSpec | null;
  readonly isKept: boolean;
  /** Hash of the draft that is there; null where there is none. */
  readonly draftSha256: string | null;
  readonly number: number;
  readonly frames: readonly FrameVersion[];
  readonly onShow: (frameId: string) => void;
  readonly onSealed: (frame: FrameVersion) => void;
}

/** The button at the foot: what it would seal, or that it is at work. */
function useSealing({ surveyId, onSealed }: Pick<FrameEditorProps, "surveyId" | "onSealed">, seen: SeenDraft) {
  const seal = useSealFrame(surveyId, seen);
  const controller = useRef<AbortController | null>(null);
  return {
    pending: seal.isPending,
    error: seal.isError && problemOf(seal.error).code !== "cancelled" ? seal.error : null,
    start: (spec: FrameSpec, cells: number) => {
      const own = new AbortController();
      controller.current = own;
      seal.mutate({ spec, cells, signal: own.signal }, { onSuccess: onSealed });
    },
    reset: seal.reset,
    cancel: () => controller.current?.abort(),
  };
}

interface SealActionProps {
  readonly sealing: ReturnType<typeof useSealing>;
  readonly units: number | null;
  /** Null while what would be sealed is not settled. */
  readonly onSeal: (() => void) | null;
}

function SealAction({ sealing, units, onSeal }: SealActionProps) {
  if (sealing.pending) {
    const detail = units === null ? undefined : `list and hash of ${formatCount(units, "cell")}`;
    return <Progress label="Sealing the frame" value={null} detail={detail} onCancel={sealing.cancel} />;
  }
  return (
    <Button variant="primary" size="wide" disabled={onSeal === null} onClick={onSeal ?? undefined}>
      {units === null ? "Seal the frame" : `Seal the frame: ${formatCount(units, "cell")}`}
    </Button>
  );
}

interface EditorMapProps extends Pick<FrameEditorProps, "surveyName"> {
  readonly editor: ReturnType<typeof useFrameEditor>;
  readonly chosen: CellAddress | null;
  readonly onChoose: (cell: CellAddress | null) => void;
}

/** The sheet with the cells that are set; while a new plane is laid out, without cells. */
function EditorMap({ surveyName, editor, chosen, onChoose }: EditorMapProps) {
  const { settings, plane, preview } = editor;
  const shownPlane = plane.data;
  const shown = preview.data;
  if (shownPlane === undefined) {
    return (
      <div className="p-8">
        {plane.isError ? (
          <Refusal error={plane.error} />
        ) : (
          <RuledLoading label="Laying the area on its plane" lines={5} />
        )}
      </div>
    );
  }
  const drawn = shown !== undefined && shown.areaId === shownPlane.areaId && shown.epsg === shownPlane.epsg;
  return (
    <FrameSheet
      surveyName={surveyName}
      plane={shownPlane}
      cells={drawn ? shown.cells[settings.preset] : null}
      spec={drawn ? shown.spec : null}
      preset={settings.preset}
      chosen={chosen}
      onChoose={onChoose}
    />
  );
}

/** The Frame stage while nothing is sealed: set, look, seal. */
export function FrameEditor(props: FrameEditorProps) {
  const { area, from, number, plural } = props;
  const [chosen, setChosen] = useState<CellAddress | null>(null);
  const seenRef = useRef(props.draftSha256);
  const sealing = useSealing(props, seenRef);
  const editor = useFrameEditor({ ...props, seenRef }, sealing.pending);
  const meanwhile = draftMeanwhile(editor.saving.error, sealing.error);
  const { settings, preview, spec } = editor;
  const current = preview.isSuccess && !preview.isPlaceholderData && editor.planeIsThere && spec !== null;
  const units = current ? (preview.data.cells[settings.preset]?.units ?? null) : null;
  return (
    <MapPage
      title="Sampling frame"
      titleNote={`version ${number}, not sealed`}
      map={<EditorMap {...props} editor={editor} chosen={chosen} onChoose={setChosen} />}
      action={
        meanwhile === undefined && (
          <SealAction
            sealing={sealing}
            units={units}
            onSeal={spec === null || units === null ? null : () => sealing.start(spec, units)}
          />
        )
      }
      actionNote={
        meanwhile !== undefined
          ? "Nothing can be sealed before it is said which settings stand."
          : units === null && !sealing.pending
            ? "What would be sealed is not settled yet: see above."
            : `A sealed frame never changes. A later change makes version ${number + 1}; draws stay with the version they were made on.`
      }
    >
      <FrameVersions frames={props.frames} shown={null} draft={number} onShow={props.onShow} />
      {from !== null && from.areaId !== area.id && (
        <Banner tone="ochre" title={`The boundary is version ${area.number} now.`}>
          These settings were made on an earlier one; the cells are laid over the newest.
        </Banner>
      )}
      {meanwhile !== undefined && (
        <DraftMeanwhile
          surveyId={props.surveyId}
          area={area}
          now={meanwhile}
          before={editor.before}
          mine={settings}
          number={number}
          onDecide={(wanted) => {
            sealing.reset();
            editor.goOn(wanted, meanwhile);
          }}
        />
      )}
      {/* What is being sealed is what stands here: it does not change meanwhile. */}
      <div inert={sealing.pending || meanwhile !== undefined}>
        <FrameSettingsPanel editor={editor} area={area} plural={plural} chosen={chosen} onChoose={setChosen} />
      </div>
      {meanwhile === undefined && editor.saving.error !== null && (
        <Refusal
          error={editor.saving.error}
          next={<Button onClick={editor.saving.again}>Keep the draft again</Button>}
        />
      )}
      {meanwhile === undefined && sealing.error !== null && <Refusal error={sealing.error} />}
    </MapPage>
  );
}
