import type { Visit } from "#shared/api/field.ts";
import { Button } from "../../components/ui/Button.tsx";
import { CopyText } from "../../components/ui/CopyText.tsx";
import { formatMetres, formatPercent } from "../../components/ui/format.ts";

interface VisitDetailProps {
  readonly visit: Visit;
  readonly onClosing: ((visitId: string) => void) | undefined;
}

/** Where the cell is, and the way to close it or why it can't be closed. */
export function VisitDetail({ visit, onClosing }: VisitDetailProps) {
  const { centre, label } = visit;
  const degrees = `${centre.lat.toFixed(6)}, ${centre.lng.toFixed(6)}`;
  const hindrance = hindranceOf(visit);
  return (
    <div className="flex max-w-[min(100%,calc(100vw-3rem))] flex-wrap items-center gap-x-6 gap-y-2 py-2">
      <p>
        {"Centre "}
        <CopyText text={degrees} label={`centre of ${label}`}>
          <span className="q-mono">{degrees}</span>
        </CopyText>
        {` (latitude, longitude); ${formatMetres(centre.eastM)} E, ${formatMetres(centre.northM)} N. `}
        {`${formatPercent(visit.shareBillionths / 1e9)} of it lies in the study area.`}
      </p>
      {onClosing !== undefined &&
        (hindrance === null ? (
          <Button onClick={() => onClosing(visit.id)}>{`Close ${label}…`}</Button>
        ) : (
          <p className="q-help">{hindrance}</p>
        ))}
    </div>
  );
}

/** Why a pick of this cell is not closed; null where it can be. */
function hindranceOf({ state, count }: Visit): string | null {
  if (state === "closed") return "The cell is closed.";
  if (count.state === "counted" || count.state === "not-in-population")
    return "The cell has its count: it is not closed, only amended.";
  return null;
}
