import { useState } from "react";
import type { AreaVersion } from "#shared/api/area.ts";
import type { FrameVersion } from "#shared/api/frame.ts";
import { useFrames } from "../../api/frames.ts";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { formatCount } from "../../components/ui/format.ts";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { FrameEditor } from "./FrameEditor.tsx";
import { FrameVersions } from "./FrameVersions.tsx";
import { SealedFrame } from "./SealedFrame.tsx";

interface FrameStageProps {
  readonly surveyId: string;
  readonly surveyName: string;
  /** What is counted, several of them. */
  readonly plural: string;
  /** Newest first. */
  readonly areas: readonly AreaVersion[];
  readonly mayChange: boolean;
  readonly mayReadFiles: boolean;
  readonly areaTo: string;
  /** The Draw stage, for who may draw. */
  readonly drawTo: string | undefined;
}

/** The Frame stage: set and seal, or look at what is sealed. */
export function FrameStage(props: FrameStageProps) {
  const frames = useFrames(props.surveyId);
  const [area] = props.areas;
  if (area === undefined) return <NoArea mayChange={props.mayChange} areaTo={props.areaTo} />;
  // Asked again now and then: when only that fails, the page stays, with what is set on it.
  if (frames.data === undefined) {
    return (
      <div className="max-w-160 p-8">
        {frames.isError ? (
          <Refusal error={frames.error} next={<Button onClick={() => void frames.refetch()}>Try again</Button>} />
        ) : (
          <RuledLoading label="Loading the frame" lines={5} />
        )}
      </div>
    );
  }
  return <LoadedFrames {...props} area={area} frames={frames.data} />;
}

function NoArea({ mayChange, areaTo }: { readonly mayChange: boolean; readonly areaTo: string }) {
  return (
    <ReadingPage
      title="There is no ground to lay cells over yet."
      lead={
        mayChange
          ? "Import the study area first; then choose the size of the cells and see what each edge rule comes to."
          : "A planner imports the study area first, and then chooses the cells."
      }
    >
      <div>
        {mayChange && (
          <ButtonLink variant="primary" to={areaTo}>
            Import the study area
          </ButtonLink>
        )}
      </div>
    </ReadingPage>
  );
}

function LoadedFrames(
  props: FrameStageProps & { readonly area: AreaVersion; readonly frames: readonly FrameVersion[] },
) {
  const { surveyId, surveyName, plural, area, frames, mayChange } = props;
  const [shown, setShown] = useState<string | null>(null);
  const [startFrom, setStartFrom] = useState<FrameVersion | null>(null);
  const draft = frames.find((frame) => frame.sealed === null);
  const sealed = frames.filter((frame) => frame.sealed !== null);
  const newest = sealed[0];
  const editing = mayChange && (draft !== undefined || startFrom !== null || newest === undefined);
  const number = draft?.number ?? (newest?.number ?? 0) + 1;
  const chosen = sealed.find((frame) => frame.id === shown);
  const frame = chosen ?? (editing ? undefined : newest);
  if (frame?.sealed != null) {
    const versions = (
      <FrameVersions frames={frames} shown={frame.id} draft={editing ? number : null} onShow={setShown} />
    );
    return (
      <SealedFrame
        key={frame.id}
        {...props}
        frame={frame}
        seal={frame.sealed}
        versions={versions}
        drawTo={frame === newest ? props.drawTo : undefined}
        onNewVersion={
          mayChange && !editing
            ? () => {
                setShown(null);
                setStartFrom(frame);
              }
            : undefined
        }
      />
    );
  }
  if (!editing) {
    return (
      <ReadingPage
        title="The frame is not sealed yet."
        lead="A planner of the survey chooses the cells and seals them; then they are shown here."
      >
        <></>
      </ReadingPage>
    );
  }
  return (
    <FrameEditor
      key={area.id}
      surveyId={surveyId}
      surveyName={surveyName}
      plural={plural}
      area={area}
      from={draft?.spec ?? startFrom?.spec ?? null}
      isKept={draft !== undefined && draft.spec.areaId === area.id}
      draftSha256={draft?.draftSha256 ?? null}
      number={number}
      frames={frames}
      onShow={setShown}
      onSealed={(made) => {
        setShown(null);
        setStartFrom(null);
        showToast(`Version ${made.number} of the frame is sealed: ${formatCount(made.sealed?.units ?? 0, "cell")}.`);
      }}
    />
  );
}
