import type { Account } from "#shared/api/accounts.ts";
import { useSession } from "../features/accounts/queries.ts";

/** Who is signed in. Throws on a page that anybody may see. */
export function useAccount(): Account {
  const account = useSession().data?.account;
  if (account === null || account === undefined) throw new RangeError("nobody is signed in on this page");
  return account;
}
