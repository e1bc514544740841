import { Navigate, Outlet, useLocation } from "react-router-dom";
import { Button } from "../components/ui/Button.tsx";
import { Refusal } from "../components/ui/Refusal.tsx";
import { RuledLoading } from "../components/ui/RuledLoading.tsx";
import { useSession } from "../features/accounts/queries.ts";
import { BaseMapContext } from "../map/base-map-context.ts";
import { paths } from "./paths.ts";
import { AccountContext } from "./use-account.ts";

/** Pages for somebody signed in; anybody else signs in first and comes back to the same address. */
export function SignedIn() {
  const session = useSession();
  const { pathname, search } = useLocation();
  // Asked again now and then: when only that fails, the page stays, with what is typed on it.
  if (session.data === undefined) {
    return (
      <div className="mx-auto max-w-160 p-8">
        {session.isError ? (
          <Refusal error={session.error} next={<Button onClick={() => void session.refetch()}>Try again</Button>} />
        ) : (
          <RuledLoading />
        )}
      </div>
    );
  }
  if (session.data.account === null) {
    const next = pathname === paths.home ? "" : `?next=${encodeURIComponent(pathname + search)}`;
    return <Navigate to={paths.signIn + next} replace />;
  }
  return (
    <AccountContext value={session.data.account}>
      <BaseMapContext value={session.data.baseMap}>
        <Outlet />
      </BaseMapContext>
    </AccountContext>
  );
}
