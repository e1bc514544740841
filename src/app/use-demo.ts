import { useSession } from "../features/accounts/queries.ts";

/** Whether this installation is the demo, which says so on every page. */
export function useDemo(): boolean {
  return useSession().data?.demo === true;
}
