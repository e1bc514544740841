import { useId } from "react";
import { Button } from "./Button.tsx";

interface ProgressProps {
  /** What is being done: "Rehearsing 1 000 surveys". */
  readonly label: string;
  /** Share done, 0 to 1; null while nobody can say. */
  readonly value: number | null;
  /** How far in words: "640 of 1 000, about 2 s left". */
  readonly detail?: string | undefined;
  readonly onCancel?: (() => void) | undefined;
}

/** Long work says how far it is and can be cancelled. */
export function Progress({ label, value, detail, onCancel }: ProgressProps) {
  const id = useId();
  const percent = value === null ? null : Math.round(Math.min(1, Math.max(0, value)) * 100);
  return (
    <div className="q-progress" data-unknown={percent === null ? "" : undefined}>
      <div className="q-progress-line">
        <b id={id}>{label}</b>
        <span>{detail ?? (percent === null ? "" : `${percent}\u00a0%`)}</span>
      </div>
      <div
        className="q-progress-bar"
        role="progressbar"
        aria-labelledby={id}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={percent ?? undefined}
        aria-valuetext={detail}
      >
        <i style={percent === null ? undefined : { width: `${percent}%` }} />
      </div>
      {onCancel !== undefined && (
        <Button variant="link" size="small" onClick={onCancel}>
          Cancel
        </Button>
      )}
    </div>
  );
}
