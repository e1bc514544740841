import { exportEstimate } from "#shared/api/estimate.ts";
import { readRecordFile } from "#shared/api/record.ts";
import { placeText } from "#shared/estimate/sentence.ts";
import { addressOf } from "../../api/call.ts";
import { Button } from "../../components/ui/Button.tsx";
import { CodeBlock } from "../../components/ui/CodeBlock.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import { formatArea } from "../../components/ui/format.ts";
import { Hash } from "../../components/ui/Hash.tsx";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import type { Estimate } from "./queries.ts";

const LIMITS = { "log-normal": "Log-normal", t: "Student t" } as const;

/** What the number speaks for, which limits and since when, and what can be taken away. */
export function EstimateMargin({ surveyId, estimate }: { readonly surveyId: string; readonly estimate: Estimate }) {
  const times = useTimes();
  const { context, result, methods } = estimate;
  const params = { surveyId };
  return (
    <>
      <MarginNote title="What it speaks for">
        <p>
          {`Every ${context.target.singular} ${placeText(result)}: ${formatArea(context.frame.summary.frameAreaM2)}. `}
          {result.countIn === "inside"
            ? "Counted only inside the boundary."
            : "Whole cells were counted, also where they reach over the boundary."}
        </p>
      </MarginNote>
      <MarginNote title="Which limits">
        <p>
          {context.chosenAfterCounts.includes("limits")
            ? `${LIMITS[result.declaredLimits]}, chosen after counts were seen.`
            : `${LIMITS[result.declaredLimits]}, declared with the draw, ${times.time(context.declaration.declaredAt)}, before the first count.`}
        </p>
      </MarginNote>
      <MarginNote title="Which draw">
        <p>
          {`Draw ${context.draw.number} on frame version ${context.frame.number}, `}
          <Hash value={context.frame.sha256} label="frame hash" />.
        </p>
      </MarginNote>
      <div className="q-screen-only">
        <MarginNote title="Take it away">
          <ul className="grid gap-1">
            <li>
              <a href={addressOf(exportEstimate, { params, query: { table: "picks" } })} download="">
                Picks and counts as CSV
              </a>
            </li>
            <li>
              <a href={addressOf(exportEstimate, { params, query: { table: "figures" } })} download="">
                Figures as CSV
              </a>
            </li>
            <li>
              <a href={addressOf(readRecordFile, { params })} download="">
                Record file for an auditor
              </a>
            </li>
            <li>
              <Button variant="link" size="small" onClick={() => window.print()}>
                Print this page
              </Button>
            </li>
          </ul>
        </MarginNote>
      </div>
      <div className="q-screen-only">
        <MarginNote title="Methods statement">
          <Fold quiet title="For your report">
            <CodeBlock code={methods} label="methods statement" />
          </Fold>
        </MarginNote>
      </div>
    </>
  );
}
