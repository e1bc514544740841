import { Button } from "../../components/ui/Button.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { useArchive } from "./queries.ts";

interface ArchiveSurveyProps {
  readonly surveyId: string;
  readonly isArchived: boolean;
}

/** Puts a survey away, or takes it out again. */
export function ArchiveSurvey({ surveyId, isArchived }: ArchiveSurveyProps) {
  const archive = useArchive(surveyId);
  const press = () => {
    if (archive.isPending) return;
    archive.mutate(!isArchived, {
      onSuccess: () => showToast(isArchived ? "The survey is in work again." : "The survey is archived."),
    });
  };
  return (
    <Section
      title="Archive"
      lead={
        isArchived
          ? "This survey is archived: it can be read and takes nothing new."
          : "An archived survey can be read and takes nothing new. It can be taken out again."
      }
    >
      <div className="grid gap-3">
        {archive.isError && <Refusal error={archive.error} />}
        <div>
          <Button variant={isArchived ? "primary" : "quiet"} busy={archive.isPending} onClick={press}>
            {isArchived ? "Take out of the archive" : "Archive the survey"}
          </Button>
        </div>
      </div>
    </Section>
  );
}
