import { Link } from "react-router-dom";
import type { Account } from "#shared/api/accounts.ts";
import { Dialog } from "../../components/ui/Dialog.tsx";
import { useSignInAgain } from "./queries.ts";
import { SignInForm } from "./SignInForm.tsx";

interface SignInAgainProps {
  readonly account: Account;
  /** The sign-in page, for whoever gives up what is on this one. */
  readonly leaveTo: string;
}

/** Over a page whose session ended: what is typed below stays. Only signing in or leaving the page ends it. */
export function SignInAgain({ account, leaveTo }: SignInAgainProps) {
  const signIn = useSignInAgain(account.id);
  return (
    <Dialog
      open
      onOpenChange={() => undefined}
      title="Sign in again to go on"
      lead={`The session of ${account.name} has ended. What you typed is still on the page; nothing more is kept until you sign in. If somebody else signs in, the page begins anew.`}
    >
      <SignInForm signIn={signIn} email={account.email}>
        <Link className="q-sign-in-aside" to={leaveTo}>
          Leave this page
        </Link>
      </SignInForm>
    </Dialog>
  );
}
