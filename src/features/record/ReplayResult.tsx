import { Button } from "../../components/ui/Button.tsx";
import { CodeBlock } from "../../components/ui/CodeBlock.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import { formatNumber } from "../../components/ui/format.ts";
import { Hash } from "../../components/ui/Hash.tsx";
import { KeyValues } from "../../components/ui/KeyValues.tsx";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { Seed } from "../../components/ui/Seed.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { CheckList } from "./CheckList.tsx";
import type { ReplayDone } from "./use-replay.ts";

interface ReplayResultProps {
  readonly done: ReplayDone;
  readonly onAnother: () => void;
}

/** What came out: the sentence, every check, and at the end what no record shows. */
export function ReplayResult({ done, onAnother }: ReplayResultProps) {
  const { report, fileName, seconds } = done;
  const { summary } = report;
  const from = `Replayed in ${formatNumber(seconds, 1)} s from ${fileName}.`;
  const what = [summary.survey, summary.target, summary.season === "" ? "" : `season ${summary.season}`];
  return (
    <ReadingPage
      answer
      title={
        <>
          <b>{summary.headline}</b> {summary.meaning}
        </>
      }
      lead={`${what.filter((part) => part !== "").join(", ")}${summary.survey === "" ? "" : ". "}${from}`}
      margin={<ResultMargin done={done} onAnother={onAnother} />}
    >
      <CheckList checks={report.checks} />
      {report.cannotShow.length > 0 && (
        <Section title="What no record shows">
          <ul className="grid max-w-(--size-measure) list-disc gap-1 pl-5">
            {report.cannotShow.map((sentence) => (
              <li key={sentence}>{sentence}</li>
            ))}
          </ul>
        </Section>
      )}
    </ReadingPage>
  );
}

function ResultMargin({ done, onAnother }: ReplayResultProps) {
  const times = useTimes();
  const { summary } = done.report;
  return (
    <>
      <MarginNote title="What was replayed">
        <KeyValues
          items={[
            { key: "Cells, N", value: formatNumber(summary.units) },
            { key: "Picks", value: formatNumber(summary.picks) },
            { key: "Counted", value: formatNumber(summary.counted) },
            { key: "Draws on record", value: formatNumber(summary.draws) },
            { key: "Newest event", value: summary.newest === null ? "none" : formatNumber(summary.newest.sequence) },
          ]}
        />
        {summary.newest !== null && (
          <p>
            Newest hash <Hash value={summary.newest.sha256} label="newest hash" />
          </p>
        )}
        {summary.exportedAt !== "" && <p>{`Saved ${times.time(summary.exportedAt)} by ${summary.software}.`}</p>}
      </MarginNote>
      {summary.seeds.map((seed) => (
        <MarginNote key={seed.of} title={`Seed of ${seed.of}`}>
          <p>
            <Seed value={seed.text} />
          </p>
          <p>{seed.sentence}</p>
        </MarginNote>
      ))}
      {summary.recipe !== null && (
        <MarginNote title="Without this page">
          <Fold quiet title="In a shell">
            <CodeBlock code={summary.recipe.shell} label="shell recipe" />
          </Fold>
          <Fold quiet title="In Python">
            <CodeBlock code={summary.recipe.python} label="Python recipe" />
          </Fold>
        </MarginNote>
      )}
      <div className="q-screen-only">
        <Button variant="primary" onClick={onAnother}>
          Replay another record
        </Button>
      </div>
    </>
  );
}
