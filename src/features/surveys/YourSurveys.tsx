import { useRef, useState } from "react";
import { useNavigate, useSearchParams } from "react-router-dom";
import { Button } from "../../components/ui/Button.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import { formatCount, formatNumber } from "../../components/ui/format.ts";
import { isFound } from "./find-surveys.ts";
import { SurveyList, type SurveyRow } from "./SurveyList.tsx";
import { SurveySearch } from "./SurveySearch.tsx";

/** The surveys of this person, looked through as one types; archived ones lie in a fold of their own, which opens where something in it is looked for. */
export function YourSurveys({ rows }: { readonly rows: readonly SurveyRow[] }) {
  const list = useRef<HTMLDivElement>(null);
  const navigate = useNavigate();
  // In the address, so that coming back from a survey finds the list as it was left.
  const [search, setSearch] = useSearchParams();
  const [text, setText] = useState(search.get("find") ?? "");
  const find = (wanted: string) => {
    setText(wanted);
    setSearch(wanted === "" ? {} : { find: wanted }, { replace: true });
  };
  const found = rows.filter((row) => isFound(row.survey, text));
  const inWork = found.filter((row) => row.survey.archivedAt === null);
  const archived = found.filter((row) => row.survey.archivedAt !== null);
  const isLooking = text.trim() !== "";
  const [first] = [...inWork, ...archived];
  return (
    <div ref={list}>
      <div className="q-surveys-head">
        <h2>Your surveys</h2>
        {rows.length > 1 && (
          <SurveySearch
            text={text}
            onChange={find}
            found={isLooking ? `${formatNumber(found.length)} of ${formatCount(rows.length, "survey")}` : ""}
            onFirst={() => {
              if (isLooking && first !== undefined) void navigate(first.to);
            }}
            onDown={() => list.current?.querySelector<HTMLElement>(".q-survey-name a")?.focus()}
          />
        )}
      </div>
      {inWork.length > 0 && <SurveyList caption="Your surveys" rows={inWork} />}
      {inWork.length === 0 && (
        <p className="q-surveys-none">
          {isLooking
            ? `No survey in work has “${text.trim()}” in its name, target or season. `
            : "No survey is in work. "}
          {isLooking && (
            <Button variant="link" onClick={() => find("")}>
              Show all
            </Button>
          )}
        </p>
      )}
      {archived.length > 0 && (
        <div className="mt-8">
          <Fold
            key={isLooking ? "looking" : "all"}
            title="Archived surveys"
            aside={formatCount(archived.length, "survey")}
            open={isLooking}
          >
            <SurveyList caption="Archived surveys" rows={archived} />
          </Fold>
        </div>
      )}
    </div>
  );
}
