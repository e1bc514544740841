import { useMutationState } from "@tanstack/react-query";
import { Link } from "react-router-dom";
import { problemOf } from "../api/problem-of.ts";
import { Menu } from "../components/ui/Menu.tsx";
import { useTimes } from "../components/ui/use-times.ts";
import { useSession, useSignOut } from "../features/accounts/queries.ts";
import { paths } from "./paths.ts";

interface HeaderEndProps {
  /** After the name: "planner". */
  readonly roles?: string;
  /** Links before the name: the replay of a record. */
  readonly links?: boolean;
}

/** The time of the last act that was kept. */
function Kept() {
  const times = useTimes();
  const kept = useMutationState({
    filters: { status: "success", predicate: (mutation) => mutation.meta?.keeps === true },
    select: (mutation) => mutation.state.submittedAt,
  });
  const last = Math.max(0, ...kept);
  if (last === 0) return null;
  const at = new Date(last).toISOString();
  return (
    <time role="status" dateTime={at} title={times.time(at)}>
      {`Kept ${times.timeOfDay(at)}${times.zone === "UTC" ? " UTC" : ""}`}
    </time>
  );
}

/** The right end of the header: what was kept when, links, and the account with its menu. */
export function HeaderEnd({ roles, links = false }: HeaderEndProps) {
  const session = useSession();
  const signOut = useSignOut();
  const account = session.data?.account;
  if (account === null || account === undefined) {
    return session.isSuccess ? <Link to={paths.signIn}>Sign in</Link> : null;
  }
  const name = roles === undefined || roles === "" ? account.name : `${account.name}, ${roles}`;
  return (
    <>
      {signOut.isError && <span role="alert">{`You are still signed in. ${problemOf(signOut.error).title}.`}</span>}
      <Kept />
      {links && (
        <Link to={paths.replay} className="q-header-link">
          Replay a record
        </Link>
      )}
      <Menu
        trigger={
          <button type="button" className="q-account-button" aria-label={`Account of ${name}`}>
            {name}
          </button>
        }
        items={[
          { kind: "link", label: "Surveys", to: paths.surveys },
          { kind: "link", label: "Account", to: paths.account },
          ...(account.isOwner ? [{ kind: "link", label: "Installation", to: paths.installation } as const] : []),
          { kind: "link", label: "Replay a record", to: paths.replay },
          { kind: "rule" },
          { kind: "act", label: "Sign out", onSelect: () => signOut.mutate() },
        ]}
      />
    </>
  );
}
