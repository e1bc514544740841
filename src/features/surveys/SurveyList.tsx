import { Link } from "react-router-dom";
import type { SurveySummary } from "#shared/api/surveys.ts";
import { formatList } from "../../components/ui/format.ts";
import type { Stage } from "../../components/ui/stage-state.ts";
import { StageLine } from "../../components/ui/StageLine.tsx";
import { Table } from "../../components/ui/Table.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { SmallOutline } from "../../map/SmallOutline.tsx";

/** A survey with what the app knows of it: where it leads, its stations and the one that matters. */
export interface SurveyRow {
  readonly survey: SurveySummary;
  readonly to: string;
  readonly stations: readonly Stage[];
  /** "Field: 2 picks not counted". */
  readonly note: string;
  readonly attention: boolean;
}

/** All surveys of this person, each with its outline, roles and the line of its stages. */
export function SurveyList({ rows }: { readonly rows: readonly SurveyRow[] }) {
  const times = useTimes();
  return (
    <div className="q-survey-list">
      <Table caption="Your surveys">
        <thead>
          <tr>
            <th scope="col" aria-label="Outline" />
            <th scope="col">Survey</th>
            <th scope="col">You are</th>
            <th scope="col">Area to Record</th>
            <th scope="col">Record</th>
            <th scope="col">Started</th>
          </tr>
        </thead>
        <tbody>
          {rows.map(({ survey, to, stations, note, attention }) => (
            <tr key={survey.id}>
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
              <td className="q-survey-record">{survey.stages.find((one) => one.stage === "record")?.note ?? ""}</td>
              <td className="q-survey-started">{times.day(survey.createdAt)}</td>
            </tr>
          ))}
        </tbody>
      </Table>
    </div>
  );
}
