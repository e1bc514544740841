import type { ReactNode } from "react";
import { Link } from "react-router-dom";
import { reachedIndex, STAGE_STATE_WORDS, type Stage } from "./stage-state.ts";
import { StageMark } from "./StageMark.tsx";
import { Tooltip } from "./Tooltip.tsx";

interface StageRailProps {
  readonly stages: readonly Stage[];
  readonly current: string | null;
  /** rail: beside the page, marks only when narrow; page: the list of stages as a page of its own. */
  readonly layout?: "rail" | "page";
  /** Links below the stations. */
  readonly foot?: ReactNode;
  readonly onGo?: () => void;
}

/** The stations of a piece of work on one line: solid up to where work has reached, dashed ahead; shape, name and words for each state. */
export function StageRail({ stages, current, layout = "rail", foot, onGo }: StageRailProps) {
  const reached = reachedIndex(stages);
  return (
    <nav className={layout === "rail" ? "q-rail" : undefined} aria-label="Stages of this survey">
      <ol className="q-stations">
        {stages.map((stage, index) => (
          <li key={stage.id} data-state={stage.state} data-line={index < reached ? "behind" : "ahead"}>
            <Tooltip
              side="right"
              text={`${stage.name}: ${stage.note ?? STAGE_STATE_WORDS[stage.state]}`}
              narrowOnly={layout === "rail"}
            >
              <Link
                className="q-station"
                to={stage.to}
                aria-current={stage.id === current ? "page" : undefined}
                onClick={onGo}
              >
                <StageMark state={stage.state} />
                <span>
                  <span className="q-station-name">{stage.name}</span>
                  <span className="q-station-note">{stage.note ?? STAGE_STATE_WORDS[stage.state]}</span>
                  {stage.note !== undefined && stage.note !== STAGE_STATE_WORDS[stage.state] && (
                    <span className="sr-only">, {STAGE_STATE_WORDS[stage.state]}</span>
                  )}
                </span>
              </Link>
            </Tooltip>
          </li>
        ))}
      </ol>
      {foot !== undefined && <div className="q-rail-foot">{foot}</div>}
    </nav>
  );
}
