import { Button } from "../../components/ui/Button.tsx";
import { KeyValues } from "../../components/ui/KeyValues.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { useSession, useSignOut } from "../../features/accounts/queries.ts";
import { PlainShell } from "../PlainShell.tsx";
import { paths } from "../paths.ts";
import { useAccount } from "../use-account.ts";

export function AccountPage() {
  const account = useAccount();
  const session = useSession();
  const signOut = useSignOut();
  return (
    <PlainShell here="Account" crumbs={[{ label: "Surveys", to: paths.surveys }]}>
      <ReadingPage title={account.name} lead="This is how you appear to the other people of your surveys.">
        <div className="grid max-w-140 gap-6">
          {signOut.isError && <Refusal error={signOut.error} />}
          <KeyValues
            items={[
              { key: "Name", value: account.name },
              { key: "E-mail", value: account.email },
              { key: "In this installation", value: account.isOwner ? "owner" : "member" },
              { key: "Version of Quillet", value: session.data?.version ?? "not known" },
            ]}
          />
          <div>
            <Button busy={signOut.isPending} busyLabel="Signing out…" onClick={() => signOut.mutate()}>
              Sign out
            </Button>
          </div>
        </div>
      </ReadingPage>
    </PlainShell>
  );
}
