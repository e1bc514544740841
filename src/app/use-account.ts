import { createContext, use } from "react";
import type { Account } from "#shared/api/accounts.ts";

export const AccountContext = createContext<Account | null>(null);

/** Who is signed in. Throws on a page that anybody may see. */
export function useAccount(): Account {
  const account = use(AccountContext);
  if (account === null) throw new RangeError("nobody is signed in on this page");
  return account;
}
