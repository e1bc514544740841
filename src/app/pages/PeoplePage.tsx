import { use } from "react";
import { Link, useNavigate, useParams } from "react-router-dom";
import { ownerMay, reach } from "#shared/access/table.ts";
import type { People } from "#shared/api/people.ts";
import type { Survey } from "#shared/api/surveys.ts";
import { ROLE_DOES } from "../../api/role-words.ts";
import { Button } from "../../components/ui/Button.tsx";
import { formatCount, formatList } from "../../components/ui/format.ts";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { AddPerson } from "../../features/surveys/people/AddPerson.tsx";
import { InvitationTable } from "../../features/surveys/people/InvitationTable.tsx";
import { LeaveSurvey } from "../../features/surveys/people/LeaveSurvey.tsx";
import { isLastPlanner, PeopleTable } from "../../features/surveys/people/PeopleTable.tsx";
import { usePeople } from "../../features/surveys/people/queries.ts";
import { CurrentSurveyContext } from "../current-survey.ts";
import { paths } from "../paths.ts";
import { useAccount } from "../use-account.ts";

const roles = (
  <>
    <MarginNote title="Two roles">One person may hold two roles, and then may do what either may.</MarginNote>
    <MarginNote title="The owner">
      Owning the installation gives no right inside a survey, but an owner may add people, and so themself. The record
      says so.
    </MarginNote>
  </>
);

/** The people of a survey; an owner of the installation reaches it without being a member. */
export function PeoplePage() {
  const { surveyId = "" } = useParams();
  const survey = use(CurrentSurveyContext);
  const account = useAccount();
  const isOwner = account.isOwner && ownerMay("people.see");
  if (survey !== null && reach(survey.roles, "people.see") === "none" && !isOwner) return <OwnPart survey={survey} />;
  return <AllPeople surveyId={surveyId} survey={survey} />;
}

/** For a role that does not see the others. */
function OwnPart({ survey }: { readonly survey: Survey }) {
  return (
    <ReadingPage
      title={`You are ${formatList(survey.roles)} of ${survey.name}.`}
      lead={survey.roles.map((role) => ROLE_DOES[role]).join(" ")}
    >
      <Leaving survey={survey} isNeeded={false} />
    </ReadingPage>
  );
}

function Leaving({ survey, isNeeded }: { readonly survey: Survey; readonly isNeeded: boolean }) {
  const navigate = useNavigate();
  if (survey.archivedAt !== null) return null;
  return (
    <Section title="Leave the survey">
      <LeaveSurvey
        surveyId={survey.id}
        survey={survey.name}
        isNeeded={isNeeded}
        onLeft={() => void navigate(paths.surveys)}
      />
    </Section>
  );
}

function leadOf({ members, invitations }: People): string {
  const here = `${formatCount(members.length, "person", "people")} in this survey`;
  if (invitations.length === 0) return `${here}.`;
  return `${here}, ${formatCount(invitations.length, "invitation")} waiting for an answer.`;
}

function AllPeople({ surveyId, survey }: { readonly surveyId: string; readonly survey: Survey | null }) {
  const account = useAccount();
  const people = usePeople(surveyId);
  const mayAdd =
    reach(survey?.roles ?? [], "people.change") !== "none" || (account.isOwner && ownerMay("people.change"));
  const isArchived = survey !== null && survey.archivedAt !== null;
  const mayChange = mayAdd && !isArchived;
  const { data } = people;
  const self = data?.members.find(({ isSelf }) => isSelf);
  const mails = account.isOwner ? (
    <Link to={`${paths.installation}#mails`}>look at the mails.</Link>
  ) : (
    "the owner of this installation finds it under Mails."
  );
  return (
    <ReadingPage title="People" lead={data && leadOf(data)} margin={roles}>
      {people.isPending && <RuledLoading label="Loading the people" />}
      {people.isError && (
        <Refusal error={people.error} next={<Button onClick={() => void people.refetch()}>Try again</Button>} />
      )}
      {data !== undefined && <PeopleTable surveyId={surveyId} members={data.members} mayChange={mayChange} />}
      {data !== undefined && data.invitations.length > 0 && (
        <Section title="Invited">
          <InvitationTable surveyId={surveyId} invitations={data.invitations} mayChange={mayChange} mails={mails} />
        </Section>
      )}
      {mayChange && (
        <Section title="Add somebody">
          <AddPerson surveyId={surveyId} />
        </Section>
      )}
      {mayAdd && isArchived && <p className="q-help">This survey is archived: its people stay as they are.</p>}
      {survey !== null && self !== undefined && data !== undefined && (
        <Leaving survey={survey} isNeeded={isLastPlanner(self, data.members)} />
      )}
    </ReadingPage>
  );
}
