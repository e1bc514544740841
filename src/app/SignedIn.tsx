import { Fragment, lazy, Suspense, useState } from "react";
import { Navigate, Outlet, useLocation } from "react-router-dom";
import type { Session } from "#shared/api/accounts.ts";
import { Button } from "../components/ui/Button.tsx";
import { Refusal } from "../components/ui/Refusal.tsx";
import { RuledLoading } from "../components/ui/RuledLoading.tsx";
import { useHasLeft, useSession } from "../features/accounts/queries.ts";
import { BaseMapContext } from "../map/base-map-context.ts";
import { paths } from "./paths.ts";
import { AccountContext } from "./use-account.ts";

const SignInAgain = lazy(async () => ({
  default: (await import("../features/accounts/SignInAgain.tsx")).SignInAgain,
}));

/** The newest session in which somebody was signed in here, unless they signed out themself. */
function useSessionHere(now: Session | undefined): Session | null {
  const [last, setLast] = useState<Session | null>(null);
  const hasLeft = useHasLeft();
  const current = now === undefined || now.account === null ? null : now;
  if (current !== null && current !== last) setLast(current);
  return current ?? (hasLeft ? null : last);
}

/**
 * Pages for somebody signed in; anybody else signs in first and comes back to the same address. A session that ends while a page
 * is open is signed in to again over that page, which keeps what is typed; for another person the page begins anew.
 */
export function SignedIn() {
  const session = useSession();
  const { pathname, search } = useLocation();
  const here = useSessionHere(session.data);
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
  const next = pathname === paths.home ? "" : `?next=${encodeURIComponent(pathname + search)}`;
  const account = here?.account;
  if (account == null) return <Navigate to={paths.signIn + next} replace />;
  return (
    <AccountContext value={account}>
      <BaseMapContext value={here?.baseMap ?? null}>
        <Fragment key={account.id}>
          <Outlet />
        </Fragment>
        {session.data.account === null && (
          <Suspense>
            <SignInAgain account={account} leaveTo={paths.signIn + next} />
          </Suspense>
        )}
      </BaseMapContext>
    </AccountContext>
  );
}
