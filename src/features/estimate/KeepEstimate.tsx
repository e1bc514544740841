import { Button } from "../../components/ui/Button.tsx";
import { formatTime } from "../../components/ui/format.ts";
import { problemOf } from "../../api/problem-of.ts";
import { showToast } from "../../components/ui/show-toast.tsx";
import { type Estimate, useKeepEstimate, useKeptEstimates } from "./queries.ts";

interface KeepEstimateProps {
  readonly surveyId: string;
  readonly estimate: Estimate;
}

/** Puts the estimate on record as it stands; says so when it is there already. */
export function KeepEstimate({ surveyId, estimate }: KeepEstimateProps) {
  const kept = useKeptEstimates(surveyId);
  const keep = useKeepEstimate(surveyId);
  const same = kept.data?.find(({ resultSha256 }) => resultSha256 === estimate.resultSha256);
  if (same !== undefined) return <p className="q-help">{`On record as it stands, ${formatTime(same.keptAt)}.`}</p>;
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
