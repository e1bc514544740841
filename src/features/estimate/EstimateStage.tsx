import type { ReactNode } from "react";
import { estimateNotes } from "#shared/estimate/notes.ts";
import { estimateSentence, levelText } from "#shared/estimate/sentence.ts";
import { Problem, type ProblemCode } from "#shared/problem.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { EmptyState } from "../../components/ui/EmptyState.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import { formatCount, formatHash, formatNumber, formatSeed, formatSignificant } from "../../components/ui/format.ts";
import { Ledger } from "../../components/ui/Ledger.tsx";
import { PrintFoot } from "../../components/ui/PrintFoot.tsx";
import { PrintHead } from "../../components/ui/PrintHead.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { CountPlot } from "./CountPlot.tsx";
import { CountsMap } from "./CountsMap.tsx";
import { DistributionTable } from "./DistributionTable.tsx";
import { EstimateMargin } from "./EstimateMargin.tsx";
import { cvText, figureText } from "./figure-words.ts";
import { FiguresTable } from "./FiguresTable.tsx";
import { Formulas } from "./Formula.tsx";
import { KeepEstimate } from "./KeepEstimate.tsx";
import { LimitsAxis } from "./LimitsAxis.tsx";
import { type Estimate, useEstimate } from "./queries.ts";

interface EstimateStageProps {
  readonly surveyId: string;
  readonly surveyName: string;
  readonly mayKeep: boolean;
  readonly countsTo: string;
}

/** The answer in one sentence, then the figures, then how they came about. */
export function EstimateStage(props: EstimateStageProps) {
  const estimate = useEstimate(props.surveyId);
  const { data, error } = estimate;
  const again = <Button onClick={() => void estimate.refetch()}>Try again</Button>;
  // Asked first: the figures of a draw that was withdrawn meanwhile stand for nothing any more.
  if (error instanceof Problem && NOTHING_YET.includes(error.code)) {
    return (
      <ReadingPage title="Estimate">
        <EmptyState title={error.title} action={<ButtonLink to={props.countsTo}>To the counts</ButtonLink>}>
          {error.message}
        </EmptyState>
      </ReadingPage>
    );
  }
  if (data !== undefined) {
    const stale = error === null ? undefined : <Refusal error={error} next={again} />;
    const asOf = new Date(estimate.dataUpdatedAt).toISOString();
    return <EstimatePage {...props} estimate={data} asOf={asOf} stale={stale} />;
  }
  return (
    <div className="p-8">
      {error === null ? (
        <RuledLoading label="Loading the estimate" lines={6} />
      ) : (
        <Refusal error={error} next={again} />
      )}
    </div>
  );
}

const NOTHING_YET: readonly ProblemCode[] = ["estimate-impossible", "draw-missing"];

interface EstimatePageProps extends EstimateStageProps {
  readonly estimate: Estimate;
  /** When these figures were asked for. */
  readonly asOf: string;
  /** Said above figures that could not be asked for again. */
  readonly stale: ReactNode;
}

function EstimatePage({ surveyId, surveyName, mayKeep, estimate, asOf, stale }: EstimatePageProps) {
  const times = useTimes();
  const { result, context } = estimate;
  const plural = context.target.plural;
  const notes = estimateNotes(result);
  return (
    <>
      <PrintHead
        title={`${surveyName}: ${plural}, season ${context.season.name}`}
        note={`Draw ${context.draw.number}, frame version ${context.frame.number}, figures of ${times.time(asOf)}`}
      />
      <ReadingPage
        answer
        title={<Answer estimate={estimate} />}
        band={
          <Ledger
            items={ledgerOf(estimate)}
            action={mayKeep ? <KeepEstimate surveyId={surveyId} estimate={estimate} /> : undefined}
          />
        }
        margin={<EstimateMargin surveyId={surveyId} estimate={estimate} />}
      >
        {stale}
        {notes
          .filter(({ weight }) => weight === "look")
          .map((note) => (
            <NoteBanner key={note.key} text={note.text} />
          ))}
        <Section title="How sure" lead={howSure(estimate)}>
          {!result.complete && <LimitsAxis result={result} />}
        </Section>
        <Section title="In figures">
          <FiguresTable result={result} plural={plural} />
        </Section>
        <Section title="The counts" lead={countsLead(estimate)}>
          <CountPlot distribution={result.distribution} plural={plural} />
          <Fold quiet title="The same in a table">
            <DistributionTable distribution={result.distribution} plural={plural} />
          </Fold>
        </Section>
        <Section title="Where they stood">
          <CountsMap surveyId={surveyId} frameId={context.frame.id} plural={plural} />
        </Section>
        <Fold open title="How the number is made" aside={`values filled in from draw ${context.draw.number}`}>
          <Formulas result={result} />
        </Fold>
        {notes.some(({ weight }) => weight === "fact") && (
          <Section title="To know">
            <ul className="grid max-w-(--size-measure) list-disc gap-1 pl-5">
              {notes
                .filter(({ weight }) => weight === "fact")
                .map((note) => (
                  <li key={note.key}>{note.text}</li>
                ))}
            </ul>
          </Section>
        )}
      </ReadingPage>
      <PrintFoot note={`event ${context.newest.sequence}, ${formatHash(context.newest.sha256)}`}>
        {`Frame ${context.frame.sha256}, seed ${context.declaration.seed === null ? "none" : formatSeed(context.declaration.seed.text)}, drawn ${times.time(context.draw.drawnAt)}`}
      </PrintFoot>
    </>
  );
}

function Answer({ estimate }: { readonly estimate: Estimate }) {
  return estimateSentence(estimate.result, { objects: estimate.context.target.plural }).map((part, index) => {
    if (part.role === "estimate") return <em key={index}>{part.text}</em>;
    return part.role === "limit" ? <b key={index}>{part.text}</b> : part.text;
  });
}

function ledgerOf({ result }: Estimate) {
  return [
    { key: "Mean per cell", value: formatSignificant(result.mean.estimate, 3) },
    {
      key: "Density per ha",
      value: result.density.kind === "known" ? formatSignificant(result.density.estimate, 4) : "no area",
    },
    {
      key: "Standard error of the total",
      value: figureText(result.total.standardError, (value) => formatSignificant(value, 3)),
    },
    { key: "CV", value: cvText(result) },
    { key: "Degrees of freedom", value: formatNumber(result.degreesOfFreedom) },
    { key: "Counted picks", value: `${formatNumber(result.picksCounted)} of ${formatNumber(result.picksInUse)}` },
  ];
}

function howSure({ result, context }: Estimate): string {
  if (result.complete)
    return "Every cell of the frame was counted: nothing is estimated, and there are no limits to draw.";
  if (result.allZero.kind === "all-zero") {
    return "Every count is zero: there is only an upper limit, under a model in which objects lie independently (Poisson).";
  }
  if (result.total.limits.t.kind === "none") return "There are no limits to draw; the sentence above says why.";
  return `Total of ${context.target.plural}, ${levelText(result.level)} limits from ${formatNumber(result.degreesOfFreedom)} degrees of freedom. With clumped counts the truth tends to lie above the t limits.`;
}

function countsLead({ result }: Estimate): string {
  const { zeros } = result.distribution;
  return `${formatNumber(zeros)} of ${formatCount(result.picksCounted, "counted pick")} found none.`;
}

/** The first sentence is the fact; what it means follows in a quieter voice. */
function NoteBanner({ text }: { readonly text: string }) {
  const end = text.search(/\. [A-Z]/);
  return (
    <Banner tone="ochre" title={end < 0 ? text : text.slice(0, end + 1)}>
      {end < 0 ? undefined : text.slice(end + 2)}
    </Banner>
  );
}
