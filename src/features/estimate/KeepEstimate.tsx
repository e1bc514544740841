import { useEffect, useRef } from "react";
import { Button } from "../../components/ui/Button.tsx";
import { problemOf } from "../../api/problem-of.ts";
import { showToast } from "../../components/ui/show-toast.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { type Estimate, useKeepEstimate, useKeptEstimates } from "./queries.ts";

interface KeepEstimateProps {
  readonly surveyId: string;
  readonly estimate: Estimate;
}

/** Puts the estimate on record as it stands; says so when it is there already. */
export function KeepEstimate({ surveyId, estimate }: KeepEstimateProps) {
  const times = useTimes();
  const kept = useKeptEstimates(surveyId);
  const keep = useKeepEstimate(surveyId);
  const said = useRef<HTMLParagraphElement>(null);
  const same = kept.data?.find(({ resultSha256 }) => resultSha256 === estimate.resultSha256);
  const keptNow = keep.isSuccess && same !== undefined;
  // The button goes away when the estimate is on record: the sentence in its place takes the focus.
  useEffect(() => {
    if (keptNow) said.current?.focus();
  }, [keptNow]);
  if (kept.isPending) return null;
  if (same !== undefined) {
    return <p ref={said} tabIndex={-1} className="q-help">{`On record as it stands, ${times.time(same.keptAt)}.`}</p>;
  }
  return (
    <div className="grid gap-1">
      <Button
        variant="primary"
        busy={keep.isPending}
        busyLabel="Keeping…"
        onClick={() => keep.mutate(estimate.resultSha256, { onSuccess: () => showToast("The estimate is on record.") })}
      >
        Keep this estimate
      </Button>
      {keep.isError && (
        <p className="q-error" role="alert">
          {`${problemOf(keep.error).title}. ${problemOf(keep.error).message}`}
        </p>
      )}
    </div>
  );
}
