import { Link } from "react-router-dom";
import { Hash } from "../../components/ui/Hash.tsx";
import { StageMark } from "../../components/ui/StageMark.tsx";
import type { StageState } from "../../components/ui/stage-state.ts";

/** Something that this person can do next in one of their surveys. */
export interface Waiting {
  readonly key: string;
  readonly state: StageState;
  /** "planner". */
  readonly role: string;
  readonly survey: string;
  readonly fact: string;
  readonly next: string;
  /** To be kept elsewhere. */
  readonly hash?: string;
  readonly link: string;
  readonly to: string;
}

/** What waits, as whom, in which survey, and where to go for it. */
export function WaitingList({ items }: { readonly items: readonly Waiting[] }) {
  return (
    <ol className="q-waiting" aria-label="What waits for you">
      {items.map((item) => (
        <li key={item.key}>
          <StageMark state={item.state} size={18} />
          <div className="q-waiting-who">
            As {item.role}
            <span>{item.survey}</span>
          </div>
          <div className="q-waiting-what">
            <b>{item.fact}</b>
            <span>
              {item.next}
              {item.hash !== undefined && (
                <>
                  {" "}
                  <Hash value={item.hash} label={`newest hash of ${item.survey}`} />
                </>
              )}
            </span>
          </div>
          <Link to={item.to}>{item.link}</Link>
        </li>
      ))}
    </ol>
  );
}
