import { Link, Navigate, useSearchParams } from "react-router-dom";
import { ProductMark } from "../../components/ui/ProductMark.tsx";
import { useSession } from "../../features/accounts/queries.ts";
import { SignInForm } from "../../features/accounts/SignInForm.tsx";
import { SignInSheet } from "../../features/accounts/SignInSheet.tsx";
import { DemoNotice } from "../DemoNotice.tsx";
import { paths } from "../paths.ts";
import { useDemo } from "../use-demo.ts";

/** Only addresses of this app are returned to. */
function safeNext(next: string | null): string {
  return next !== null && /^\/(?![/\\])/.test(next) ? next : paths.home;
}

export function SignInPage() {
  const session = useSession();
  const [query] = useSearchParams();
  const demo = useDemo();
  if (session.data?.account != null) return <Navigate to={safeNext(query.get("next"))} replace />;
  return (
    <div className="q-sign-in">
      <title>Sign in · Quillet</title>
      <div className="q-sign-in-picture">
        <SignInSheet />
      </div>
      <main className="q-sign-in-text">
        <h1 className="q-sign-in-name">
          <ProductMark size={48} />
          Quillet
        </h1>
        <p className="q-sign-in-what">
          Draw the cells to visit in ground too large to count completely, and defend the number years later.
        </p>
        <p className="q-sign-in-meaning">A quillet is a small plot of land.</p>
        <SignInForm />
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
      </main>
    </div>
  );
}
