import { Fragment } from "react";
import { reachedIndex, STAGE_STATE_WORDS, type Stage } from "./stage-state.ts";
import { StageMark } from "./StageMark.tsx";

interface StageLineProps {
  readonly stages: readonly Pick<Stage, "id" | "name" | "state" | "to">[];
  /** The stage that matters now, named below: "Field: 2 picks not counted". */
  readonly note?: string;
  readonly attention?: boolean;
}

/** All stations of a survey in one row, as on the list of surveys. Its text says the same in words. */
export function StageLine({ stages, note, attention = false }: StageLineProps) {
  const reached = reachedIndex(stages);
  const step = 250 / Math.max(1, stages.length - 1);
  return (
    <div>
      <svg
        className="block max-w-full"
        width="268"
        height="18"
        viewBox="0 0 268 18"
        role="img"
        aria-label={stages.map((stage) => `${stage.name} ${STAGE_STATE_WORDS[stage.state]}`).join(", ")}
      >
        {stages.map((stage, index) => (
          <Fragment key={stage.id}>
            {index < stages.length - 1 && (
              <path
                d={`M${9 + index * step} 9H${9 + (index + 1) * step}`}
                stroke={index < reached ? "var(--color-ink)" : "var(--color-rule-2)"}
                strokeWidth="1.5"
                strokeDasharray={index < reached ? undefined : "3 3"}
              />
            )}
          </Fragment>
        ))}
        {stages.map((stage, index) => (
          <g key={stage.id} transform={`translate(${1 + index * step} 1)`}>
            <StageMark state={stage.state} />
          </g>
        ))}
      </svg>
      {note !== undefined && (
        <p className="q-stage-line-note" data-state={attention ? "attention" : undefined}>
          {note}
        </p>
      )}
    </div>
  );
}
