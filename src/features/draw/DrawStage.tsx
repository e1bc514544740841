import { type ReactNode, useState } from "react";
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
import { FIRST_TEXTS } from "./declare-form.ts";
import { DrawHistory } from "./DrawHistory.tsx";
import { DrawSteps } from "./DrawSteps.tsx";
import { LiveDraw } from "./LiveDraw.tsx";
import { OpenDeclaration } from "./OpenDeclaration.tsx";
import { type Draws, pastDeclarations } from "./past-declarations.ts";
import { useDraw, useDraws, useOvertaken } from "./queries.ts";

interface DrawStageProps {
  readonly surveyId: string;
  readonly mayDraw: boolean;
  readonly mayRepeat: boolean;
  readonly frameTo: string;
  readonly fieldTo: string;
  readonly recordTo: string;
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
  return <Loaded {...props} draws={draws.data} frame={frames.data.find(({ sealed }) => sealed !== null)} />;
}

interface LoadedProps extends DrawStageProps {
  readonly draws: Draws;
  /** The newest sealed version. */
  readonly frame: FrameVersion | undefined;
}

/** What was typed for a declaration is kept here: somebody else's declaration may take the form's place for a while. */
function Loaded({ draws, frame, ...props }: LoadedProps) {
  const { surveyId, mayDraw } = props;
  const [texts, setTexts] = useState(FIRST_TEXTS);
  const overtaken = useOvertaken(surveyId);
  const past = pastDeclarations(draws);
  const history = <DrawHistory surveyId={surveyId} past={past} />;
  const notice = overtaken === null ? null : <Refusal error={overtaken} />;
  if (draws.liveDrawId !== null) {
    return <Live key={draws.liveDrawId} {...props} drawId={draws.liveDrawId} notice={notice} history={history} />;
  }
  const open = draws.declarations.find(({ state }) => state === "open");
  if (open !== undefined) {
    return (
      <Steps at="seed" ground={{ number: open.frameNumber, units: open.units }}>
        {notice}
        <OpenDeclaration key={open.id} surveyId={surveyId} declaration={open} past={past} mayDraw={mayDraw} />
        {history}
      </Steps>
    );
  }
  if (!frame?.sealed) return <NoFrame {...props} history={history} />;
  return (
    <Steps at="declare" ground={{ number: frame.number, units: frame.sealed.units }}>
      {notice}
      {mayDraw ? (
        <DeclareForm
          surveyId={surveyId}
          frameId={frame.id}
          units={frame.sealed.units}
          texts={texts}
          onTexts={setTexts}
          reasonNeeded={draws.reasonNeeded}
          drawsOnFrame={draws.draws.filter(({ frameId }) => frameId === frame.id).length}
        />
      ) : (
        <p>A planner of the survey declares the draw here.</p>
      )}
      {history}
    </Steps>
  );
}

interface LiveProps extends DrawStageProps {
  readonly drawId: string;
  readonly notice: ReactNode;
  readonly history: ReactNode;
}

function Live({ drawId, ...props }: LiveProps) {
  const draw = useDraw(props.surveyId, drawId);
  if (draw.data === undefined) {
    return (
      <div className="p-8">
        {draw.error === null ? <RuledLoading label="Loading the draw" lines={6} /> : <Refusal error={draw.error} />}
      </div>
    );
  }
  return <LiveDraw {...props} draw={draw.data} />;
}

function NoFrame({ mayDraw, frameTo, history }: DrawStageProps & { readonly history: ReactNode }) {
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

interface StepsProps {
  readonly at: "declare" | "seed";
  /** The frame version that is drawn from, and its cells. */
  readonly ground: { readonly number: number; readonly units: number };
  readonly children: ReactNode;
}

/** The page on the way to a draw: where it stands, and why in this order. */
function Steps({ at, ground, children }: StepsProps) {
  return (
    <ReadingPage
      title={at === "declare" ? "Say what will be drawn" : "Declared. Now the seed, and the draw"}
      lead={`Frame version ${ground.number} is sealed: ${formatCount(ground.units, "cell")}. First everything is declared, then the seed is made, then the cells are drawn: three events on record, in this order.`}
      band={<DrawSteps at={at} />}
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
    </ReadingPage>
  );
}
