import { Link, Navigate, useSearchParams } from "react-router-dom";
import { useSession, useSignIn } from "../../features/accounts/queries.ts";
import { SignInForm } from "../../features/accounts/SignInForm.tsx";
import { DemoNotice } from "../DemoNotice.tsx";
import { DoorPage } from "../DoorPage.tsx";
import { paths } from "../paths.ts";
import { useDemo } from "../use-demo.ts";

/** Only addresses of this app are returned to. */
function safeNext(next: string | null): string {
  return next !== null && /^\/(?![/\\])/.test(next) ? next : paths.home;
}

export function SignInPage() {
  const session = useSession();
  const signIn = useSignIn();
  const [query] = useSearchParams();
  const demo = useDemo();
  if (session.data?.account != null) return <Navigate to={safeNext(query.get("next"))} replace />;
  return (
    <DoorPage here="Sign in">
      <p className="q-sign-in-what">
        Draw the cells to visit in ground too large to count completely, and defend the number years later.
      </p>
      <p className="q-sign-in-meaning">A quillet is a small plot of land.</p>
      <SignInForm signIn={signIn}>
        <Link className="q-sign-in-aside" to={paths.askForReset}>
          Forgot the password
        </Link>
      </SignInForm>
      {demo && (
        <p className="q-help">
          <DemoNotice /> The passwords were printed where it was started.
        </p>
      )}
      <div className="q-sign-in-space" />
      <div className="q-sign-in-auditor">
        <h2>Holding a record file?</h2>
        <p>Repeat its draw in your own browser. No account is needed and the file is not sent anywhere.</p>
        <Link to={paths.replay}>Replay a record</Link>
      </div>
    </DoorPage>
  );
}
