import { useQueryClient } from "@tanstack/react-query";
import { Link, useNavigate, useParams } from "react-router-dom";
import type { InvitationSeen } from "#shared/api/people.ts";
import { listSurveys } from "#shared/api/surveys.ts";
import { call } from "../../api/call.ts";
import { surveysKey } from "../../api/keys.ts";
import { problemOf } from "../../api/problem-of.ts";
import { ROLE_DOES } from "../../api/role-words.ts";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { HashBlock } from "../../components/ui/HashBlock.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { InvitationForm } from "../../features/accounts/InvitationForm.tsx";
import { useInvitation } from "../../features/accounts/link-queries.ts";
import { useSession } from "../../features/accounts/queries.ts";
import { DoorPage } from "../DoorPage.tsx";
import { paths } from "../paths.ts";
import { waitingIn } from "../waiting.ts";

function titleOf({ survey, role, makesOwner, invitedBy }: InvitationSeen): string {
  if (survey !== null && role !== null) return `${invitedBy} invites you to ${survey}, as ${role}.`;
  return `${invitedBy} invites you to this installation of Quillet${makesOwner ? ", as one of its owners" : ""}.`;
}

/** What the role does, in one sentence. */
function leadOf({ role, makesOwner }: InvitationSeen): string {
  if (role !== null) return ROLE_DOES[role];
  if (makesOwner)
    return "An owner looks after accounts, mails and copies of everything, and can bring people into surveys.";
  return "With an account you can start surveys of your own and be brought into others.";
}

/** To the stage that waits for the new role in the survey; where none does, to its own address, which knows where to go. */
function useFirstTask(role: InvitationSeen["role"]) {
  const queries = useQueryClient();
  const navigate = useNavigate();
  return async (surveyId: string | null) => {
    if (surveyId === null) {
      await navigate(paths.home, { replace: true });
      return;
    }
    const list = await call(listSurveys).catch(() => null);
    if (list !== null) queries.setQueryData(surveysKey, list);
    const joined = list?.surveys.filter(({ id }) => id === surveyId) ?? [];
    const first = waitingIn(joined).find((item) => item.role === role && item.to !== paths.people(surveyId));
    await navigate(first?.to ?? paths.survey(surveyId), { replace: true });
  };
}

function KeepFingerprint({ value }: { readonly value: string }) {
  return (
    <section className="q-sign-in-keep">
      <h2>Keep this outside of here</h2>
      <p className="q-help">
        The fingerprint of the key that signs the record. It stands in the mail as well; a replay of the record asks for
        it, and shows by it that the key was not exchanged.
      </p>
      <HashBlock value={value} label="fingerprint" />
    </section>
  );
}

function Invited({ secret, invitation }: { readonly secret: string; readonly invitation: InvitationSeen }) {
  const times = useTimes();
  const account = useSession().data?.account;
  const goOn = useFirstTask(invitation.role);
  const isSignedIn = account?.email === invitation.email;
  return (
    <DoorPage here="Invitation" title={titleOf(invitation)}>
      <p className="q-sign-in-lead">{leadOf(invitation)}</p>
      <p className="q-help">{`The invitation works once, until ${times.time(invitation.expiresAt)}. Whoever does not want to take part closes this page; nothing happens then.`}</p>
      {invitation.role === "auditor" && <KeepFingerprint value={invitation.keyFingerprint} />}
      {account != null && !isSignedIn && (
        <p className="q-help">{`${account.name} is signed in at this browser. Accepting ends that session and signs in ${invitation.email}.`}</p>
      )}
      <InvitationForm
        secret={secret}
        invitation={invitation}
        isSignedIn={isSignedIn}
        onAccepted={(surveyId) => void goOn(surveyId)}
      />
      {invitation.hasAccount && (
        <p className="mt-4">
          <Link to={paths.askForReset}>Forgot the password</Link>
        </p>
      )}
    </DoorPage>
  );
}

/** Where the link of an invitation leads. */
export function InvitationPage() {
  const { secret = "" } = useParams();
  const invitation = useInvitation(secret);
  if (invitation.data !== undefined) return <Invited secret={secret} invitation={invitation.data} />;
  if (invitation.isPending) {
    return (
      <DoorPage here="Invitation" title="An invitation">
        <RuledLoading label="Loading the invitation" />
      </DoorPage>
    );
  }
  const hasEnded = problemOf(invitation.error).code === "link-ended";
  return (
    <DoorPage here="Invitation" title={hasEnded ? "This invitation has ended." : "The invitation cannot be read now."}>
      <div className="mt-6 grid gap-4">
        <Refusal
          error={invitation.error}
          next={hasEnded ? undefined : <Button onClick={() => void invitation.refetch()}>Try again</Button>}
        />
        {hasEnded && (
          <div>
            <p className="q-help mb-3">You accepted it yourself, or have an account already? Then sign in.</p>
            <ButtonLink to={paths.signIn}>Sign in</ButtonLink>
          </div>
        )}
      </div>
    </DoorPage>
  );
}
