import { useMutationState } from "@tanstack/react-query";
import { Link } from "react-router-dom";
import { Menu } from "../components/ui/Menu.tsx";
import { useSession, useSignOut } from "../features/accounts/queries.ts";
import { paths } from "./paths.ts";

interface HeaderEndProps {
  /** After the name: "planner". */
  readonly roles?: string;
  /** Links before the name: the replay of a record. */
  readonly links?: boolean;
}

/** The time of the last act on this page that was kept, on the clock of whoever reads it. */
function Kept() {
  const times = useMutationState({
    filters: { status: "success", predicate: (mutation) => mutation.meta?.keeps === true },
    select: (mutation) => mutation.state.submittedAt,
  });
  const last = Math.max(0, ...times);
  if (last === 0) return null;
  const at = new Date(last);
  const two = (value: number) => String(value).padStart(2, "0");
  return (
    <span role="status">
      Kept {two(at.getHours())}:{two(at.getMinutes())}
    </span>
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
          { kind: "link", label: "Replay a record", to: paths.replay },
          { kind: "rule" },
          { kind: "act", label: "Sign out", onSelect: () => signOut.mutate() },
        ]}
      />
    </>
  );
}
