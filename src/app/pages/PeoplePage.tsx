import { use } from "react";
import { useParams } from "react-router-dom";
import { ownerMay, reach } from "#shared/access/table.ts";
import { Button } from "../../components/ui/Button.tsx";
import { formatCount } from "../../components/ui/format.ts";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { AddMember } from "../../features/surveys/AddMember.tsx";
import { MemberTable } from "../../features/surveys/MemberTable.tsx";
import { useMembers } from "../../features/surveys/queries.ts";
import { CurrentSurveyContext } from "../current-survey.ts";
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
  const members = useMembers(surveyId);
  const held = survey?.roles ?? [];
  const mayAdd = reach(held, "people.change") !== "none" || (account.isOwner && ownerMay("people.change"));
  return (
    <ReadingPage
      title="People"
      lead={
        members.data !== undefined
          ? `${formatCount(members.data.length, "person", "people")} in this survey.`
          : undefined
      }
      margin={roles}
    >
      {members.isPending && <RuledLoading label="Loading the people" />}
      {members.isError && (
        <Refusal error={members.error} next={<Button onClick={() => void members.refetch()}>Try again</Button>} />
      )}
      {members.data !== undefined && <MemberTable members={members.data} />}
      {mayAdd && (
        <Section title="Add somebody">
          <AddMember surveyId={surveyId} />
        </Section>
      )}
    </ReadingPage>
  );
}
