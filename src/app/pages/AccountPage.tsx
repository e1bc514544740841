import { Link } from "react-router-dom";
import { Button } from "../../components/ui/Button.tsx";
import { KeyValues } from "../../components/ui/KeyValues.tsx";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { NameForm } from "../../features/accounts/NameForm.tsx";
import { PasswordForm } from "../../features/accounts/PasswordForm.tsx";
import { useSession, useSignOut } from "../../features/accounts/queries.ts";
import { SessionTable } from "../../features/accounts/SessionTable.tsx";
import { PlainShell } from "../PlainShell.tsx";
import { paths } from "../paths.ts";
import { useAccount } from "../use-account.ts";

export function AccountPage() {
  const account = useAccount();
  const session = useSession();
  const signOut = useSignOut();
  const notes = (
    <>
      {account.isOwner && (
        <MarginNote title="The owner">
          <p>You look after this installation: accounts, mails, copies.</p>
          <Link to={paths.installation}>To the installation</Link>
        </MarginNote>
      )}
      <MarginNote title="Your address">
        Invitations and links come to it. Planners, leads and auditors of your surveys see it, and the owner; no record
        holds it.
      </MarginNote>
    </>
  );
  return (
    <PlainShell here="Account" crumbs={[{ label: "Surveys", to: paths.surveys }]}>
      <ReadingPage
        title={account.name}
        lead="This is how you appear to the other people of your surveys."
        margin={notes}
        actions={
          <Button busy={signOut.isPending} busyLabel="Signing out…" onClick={() => signOut.mutate()}>
            Sign out
          </Button>
        }
      >
        {signOut.isError && <Refusal error={signOut.error} />}
        <KeyValues
          items={[
            { key: "E-mail", value: account.email },
            { key: "In this installation", value: account.isOwner ? "owner" : "member" },
            { key: "Version of Quillet", value: session.data?.version ?? "not known" },
          ]}
        />
        <Section title="Your name">
          <NameForm name={account.name} />
        </Section>
        <Section title="Your password">
          <PasswordForm email={account.email} />
        </Section>
        <Section title="Where you are signed in">
          <SessionTable />
        </Section>
      </ReadingPage>
    </PlainShell>
  );
}
