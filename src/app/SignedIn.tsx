import { Navigate, Outlet, useLocation } from "react-router-dom";
import { Button } from "../components/ui/Button.tsx";
import { Refusal } from "../components/ui/Refusal.tsx";
import { RuledLoading } from "../components/ui/RuledLoading.tsx";
import { useSession } from "../features/accounts/queries.ts";
import { paths } from "./paths.ts";
import { AccountContext } from "./use-account.ts";

/** Pages for somebody signed in; anybody else signs in first and comes back to the same address. */
export function SignedIn() {
  const session = useSession();
  const { pathname, search } = useLocation();
  if (session.isPending) {
    return (
      <div className="p-8">
        <RuledLoading />
      </div>
    );
  }
  if (session.isError) {
    return (
      <div className="mx-auto max-w-160 p-8">
        <Refusal error={session.error} next={<Button onClick={() => void session.refetch()}>Try again</Button>} />
      </div>
    );
  }
  if (session.data.account === null) {
    const next = pathname === paths.home ? "" : `?next=${encodeURIComponent(pathname + search)}`;
    return <Navigate to={paths.signIn + next} replace />;
  }
  return (
    <AccountContext value={session.data.account}>
      <Outlet />
    </AccountContext>
  );
}
