import { useState } from "react";
import { useNavigate } from "react-router-dom";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { NewSurveyForm } from "../../features/surveys/NewSurveyForm.tsx";
import { paths } from "../paths.ts";
import { PlainShell } from "../PlainShell.tsx";

export function NewSurveyPage() {
  const navigate = useNavigate();
  const [now] = useState(() => new Date());
  return (
    <PlainShell here="New survey" crumbs={[{ label: "Surveys", to: paths.surveys }]}>
      <ReadingPage
        title="Start a survey"
        lead="One study area, and what is counted there. The boundary comes next."
        margin={
          <>
            <MarginNote title="One object">
              Decide what is one before anybody counts: two people who count by different rules measure two things.
            </MarginNote>
            <MarginNote title="A season">
              A survey may run over several seasons on the same ground. It starts with one.
            </MarginNote>
          </>
        }
      >
        <NewSurveyForm now={now} onStarted={(surveyId) => void navigate(paths.stage(surveyId, "area"))} />
      </ReadingPage>
    </PlainShell>
  );
}
