import { estimateNotes } from "#shared/estimate/notes.ts";
import { estimateSentence } from "#shared/estimate/sentence.ts";
import { Problem } from "#shared/problem.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { EmptyState } from "../../components/ui/EmptyState.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import {
  formatHash,
  formatNumber,
  formatPercent,
  formatSeed,
  formatSignificant,
  formatTime,
} from "../../components/ui/format.ts";
import { Ledger } from "../../components/ui/Ledger.tsx";
import { PrintFoot } from "../../components/ui/PrintFoot.tsx";
import { PrintHead } from "../../components/ui/PrintHead.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { Section } from "../../components/ui/Section.tsx";
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
  if (estimate.data !== undefined) return <EstimatePage {...props} estimate={estimate.data} />;
  if (estimate.error instanceof Problem && ["estimate-impossible", "draw-missing"].includes(estimate.error.code)) {
    return (
      <ReadingPage title="Estimate">
        <EmptyState title={estimate.error.title} action={<ButtonLink to={props.countsTo}>To the counts</ButtonLink>}>
          {estimate.error.message}
        </EmptyState>
      </ReadingPage>
    );
  }
  return (
    <div className="p-8">
      {estimate.error === null ? (
        <RuledLoading label="Loading the estimate" lines={6} />
      ) : (
        <Refusal error={estimate.error} next={<Button onClick={() => void estimate.refetch()}>Try again</Button>} />
      )}
    </div>
  );
}

function EstimatePage({
  surveyId,
  surveyName,
  mayKeep,
  estimate,
}: EstimateStageProps & { readonly estimate: Estimate }) {
  const { result, context } = estimate;
  const plural = context.target.plural;
  const notes = estimateNotes(result);
  return (
    <>
      <PrintHead
        title={surveyName}
        note={`Draw ${context.draw.number}, frame version ${context.frame.number}, season ${context.season.name}`}
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
        {notes
          .filter(({ weight }) => weight === "look")
          .map((note) => (
            <NoteBanner key={note.key} text={note.text} />
          ))}
        <Section title="How sure" lead={howSure(estimate)}>
          <LimitsAxis result={result} />
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
        {`Frame ${context.frame.sha256}, seed ${context.declaration.seed === null ? "none" : formatSeed(context.declaration.seed.text)}, drawn ${formatTime(context.draw.drawnAt)}`}
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
  if (result.total.limits.t.kind === "none") return "There are no limits to draw; the sentence above says why.";
  const level = formatPercent(result.level, Number.isInteger(Math.round(result.level * 1000) / 10) ? 0 : 1);
  return `Total of ${context.target.plural}, ${level} limits from ${formatNumber(result.degreesOfFreedom)} degrees of freedom. With clumped counts the truth tends to lie above the t limits.`;
}

function countsLead({ result }: Estimate): string {
  const { zeros } = result.distribution;
  return `One mark for each counted pick: ${formatNumber(zeros)} of ${formatNumber(result.picksCounted)} found none.`;
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
