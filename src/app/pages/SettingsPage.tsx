import { useNavigate } from "react-router-dom";
import { reach } from "#shared/access/table.ts";
import type { Survey } from "#shared/api/surveys.ts";
import { Button } from "../../components/ui/Button.tsx";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { ArchiveSurvey } from "../../features/settings/ArchiveSurvey.tsx";
import { CopySurvey } from "../../features/settings/CopySurvey.tsx";
import { DeleteSurvey } from "../../features/settings/DeleteSurvey.tsx";
import { useSettings } from "../../features/settings/queries.ts";
import { SettingsFacts } from "../../features/settings/SettingsFacts.tsx";
import { SettingsForm } from "../../features/settings/SettingsForm.tsx";
import { useCurrentSurvey } from "../current-survey.ts";
import { paths } from "../paths.ts";

const notes = (
  <>
    <MarginNote title="On record">
      A change is an event: what stood before, what stands now, who and when. Kept estimates stay as they were.
    </MarginNote>
    <MarginNote title="Two at once">
      When somebody else changes the settings while you write, you see both versions and choose field by field.
    </MarginNote>
  </>
);

/** What is set for a survey: everybody may read it, planners may change it, copy it, put it away and delete it. */
export function SettingsPage() {
  const survey = useCurrentSurvey();
  const settings = useSettings(survey.id);
  const mayChange = reach(survey.roles, "settings.change") !== "none";
  const isArchived = survey.archivedAt !== null;
  return (
    <ReadingPage
      title="Settings"
      lead={mayChange ? undefined : "A planner of the survey changes these."}
      margin={mayChange ? notes : undefined}
    >
      {settings.isPending && <RuledLoading label="Loading the settings" lines={5} />}
      {settings.data === undefined && settings.isError && (
        <Refusal error={settings.error} next={<Button onClick={() => void settings.refetch()}>Try again</Button>} />
      )}
      {settings.data !== undefined &&
        (mayChange && !isArchived ? (
          <SettingsForm key={survey.id} surveyId={survey.id} latest={settings.data} />
        ) : (
          <SettingsFacts settings={settings.data.value} />
        ))}
      {mayChange && <WholeSurvey survey={survey} />}
    </ReadingPage>
  );
}

/** What is done with the survey as a whole. */
function WholeSurvey({ survey }: { readonly survey: Survey }) {
  const navigate = useNavigate();
  return (
    <>
      <CopySurvey
        key={survey.id}
        surveyId={survey.id}
        surveyName={survey.name}
        onCopied={(id) => {
          showToast("The copy has begun: check its settings, then its boundary.");
          void navigate(paths.settings(id));
        }}
      />
      <ArchiveSurvey surveyId={survey.id} isArchived={survey.archivedAt !== null} />
      <DeleteSurvey
        surveyId={survey.id}
        surveyName={survey.name}
        onDeleted={() => {
          showToast(`${survey.name} is deleted.`);
          void navigate(paths.surveys);
        }}
      />
    </>
  );
}
