import type { ReactNode } from "react";
import type { FrameVersion } from "#shared/api/frame.ts";
import { useFrames } from "../../api/frames.ts";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { EmptyState } from "../../components/ui/EmptyState.tsx";
import { formatCount } from "../../components/ui/format.ts";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { DeclareForm } from "./DeclareForm.tsx";
import { DrawHistory } from "./DrawHistory.tsx";
import { DrawSteps } from "./DrawSteps.tsx";
import { LiveDraw } from "./LiveDraw.tsx";
import { OpenDeclaration } from "./OpenDeclaration.tsx";
import { useDraw, useDraws } from "./queries.ts";

interface DrawStageProps {
  readonly surveyId: string;
  readonly mayDraw: boolean;
  readonly mayRepeat: boolean;
  readonly frameTo: string;
  readonly fieldTo: string;
}

/** Declared, then the seed, then the draw: three events on one screen; afterwards the draw itself. */
export function DrawStage(props: DrawStageProps) {
  const frames = useFrames(props.surveyId);
  const draws = useDraws(props.surveyId);
  const error = frames.error ?? draws.error;
  if (frames.data === undefined || draws.data === undefined) {
    return (
      <div className="p-8">
        {error === null ? <RuledLoading label="Loading the draws" /> : <Refusal error={error} />}
      </div>
    );
  }
  const history = <DrawHistory draws={draws.data} />;
  if (draws.data.liveDrawId !== null) {
    return <Live {...props} drawId={draws.data.liveDrawId} history={history} />;
  }
  const open = draws.data.declarations.find(({ state }) => state === "open");
  const frame = frames.data.find(({ sealed }) => sealed !== null);
  return (
    <Before {...props} frame={frame} history={history} step={open === undefined ? "declare" : "seed"}>
      {open !== undefined ? (
        <OpenDeclaration surveyId={props.surveyId} declaration={open} mayDraw={props.mayDraw} />
      ) : frame?.sealed && props.mayDraw ? (
        <DeclareForm
          surveyId={props.surveyId}
          frameId={frame.id}
          sealed={frame.sealed}
          reasonNeeded={draws.data.reasonNeeded !== null}
        />
      ) : (
        <p>A planner of the survey declares the draw here.</p>
      )}
    </Before>
  );
}

function Live({
  drawId,
  history,
  ...props
}: DrawStageProps & { readonly drawId: string; readonly history: ReactNode }) {
  const draw = useDraw(props.surveyId, drawId);
  if (draw.data === undefined) {
    return (
      <div className="p-8">
        {draw.error === null ? <RuledLoading label="Loading the draw" lines={6} /> : <Refusal error={draw.error} />}
      </div>
    );
  }
  return <LiveDraw {...props} draw={draw.data} history={history} />;
}

interface BeforeProps extends DrawStageProps {
  readonly frame: FrameVersion | undefined;
  readonly step: "declare" | "seed";
  readonly history: ReactNode;
  readonly children: ReactNode;
}

function Before({ frame, step, history, children, mayDraw, frameTo }: BeforeProps) {
  if (!frame?.sealed) {
    return (
      <ReadingPage title="Draw">
        <EmptyState
          title="No frame is sealed yet"
          action={
            mayDraw ? (
              <ButtonLink variant="primary" to={frameTo}>
                To the frame
              </ButtonLink>
            ) : undefined
          }
        >
          A draw quotes the hash of a sealed frame, so that nobody can change the list afterwards. Seal the frame first.
        </EmptyState>
        {history}
      </ReadingPage>
    );
  }
  return (
    <ReadingPage
      title={step === "declare" ? "Say what will be drawn" : "Declared. Now the seed, and the draw"}
      lead={`Frame version ${frame.number} is sealed: ${formatCount(frame.sealed.units, "cell")}. First everything is declared, then the seed is made, then the cells are drawn: three events on record, in this order.`}
      band={<DrawSteps at={step} />}
      margin={
        <>
          <MarginNote title="Why this order">
            <p>
              A seed that exists before its declaration could have been tried first. Here the record shows that it was
              not.
            </p>
          </MarginNote>
          <MarginNote title="Draw again?">
            <p>Every declaration and every draw stays on record, the withdrawn ones too.</p>
          </MarginNote>
        </>
      }
    >
      {children}
      {history}
    </ReadingPage>
  );
}
