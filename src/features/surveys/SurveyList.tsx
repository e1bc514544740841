import type { KeyboardEvent } from "react";
import { Link } from "react-router-dom";
import type { ListedSurvey } from "#shared/api/surveys.ts";
import { formatList, formatNumber } from "../../components/ui/format.ts";
import type { Stage } from "../../components/ui/stage-state.ts";
import { StageLine } from "../../components/ui/StageLine.tsx";
import { Table } from "../../components/ui/Table.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { SmallOutline } from "../../map/SmallOutline.tsx";

/** A survey with what the app knows of it: where it leads, its stations and the one that matters. */
export interface SurveyRow {
  readonly survey: ListedSurvey;
  readonly to: string;
  readonly stations: readonly Stage[];
  /** "Field: 2 picks not counted". */
  readonly note: string;
  readonly attention: boolean;
}

const LINKS = ".q-survey-name a";

/** Up and down from survey to survey. */
function moveAlong(event: KeyboardEvent<HTMLElement>): void {
  const step = event.key === "ArrowDown" ? 1 : event.key === "ArrowUp" ? -1 : 0;
  if (step === 0 || !(event.target instanceof HTMLElement) || !event.target.matches(LINKS)) return;
  const links = [...event.currentTarget.querySelectorAll<HTMLElement>(LINKS)];
  const next = links[links.indexOf(event.target) + step];
  if (next === undefined) return;
  event.preventDefault();
  next.focus();
}

interface SurveyListProps {
  /** "Your surveys". */
  readonly caption: string;
  readonly rows: readonly SurveyRow[];
}

/** Surveys of this person, each with its outline, roles, the line of its stages, and when something last happened. */
export function SurveyList({ caption, rows }: SurveyListProps) {
  return (
    <div className="q-survey-list" onKeyDown={moveAlong}>
      <Table caption={caption}>
        <thead>
          <tr>
            <th scope="col" aria-label="Outline" />
            <th scope="col">Survey</th>
            <th scope="col">You are</th>
            <th scope="col">Area to Record</th>
            <th scope="col">Newest event</th>
            <th scope="col" className="q-num">
              Events
            </th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <SurveyLine key={row.survey.id} row={row} />
          ))}
        </tbody>
      </Table>
    </div>
  );
}

function SurveyLine({ row: { survey, to, stations, note, attention } }: { readonly row: SurveyRow }) {
  const times = useTimes();
  const { newestEvent } = survey;
  return (
    <tr>
      <td className="q-survey-outline">
        <SmallOutline polygons={survey.outline} degrees />
      </td>
      <td className="q-survey-name">
        <Link to={to}>{survey.name}</Link>
        <span>{`${survey.target}, season ${survey.season}`}</span>
      </td>
      <td className="q-survey-roles">{formatList(survey.roles)}</td>
      <td className="q-survey-stages">
        <StageLine stages={stations} note={note} attention={attention} />
      </td>
      <td className="q-survey-record">{newestEvent === null ? "not for your role" : times.recent(newestEvent.at)}</td>
      <td className="q-survey-record q-num">{newestEvent === null ? "" : formatNumber(newestEvent.sequence)}</td>
    </tr>
  );
}
