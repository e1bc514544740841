import { STATE_WORDS } from "#shared/counts/count.ts";
import { formatAsIs } from "../../components/ui/format.ts";
import type { Said } from "./queries.ts";

/** "7 burrows", "refused". */
export function saidText(said: Said, plural: string): string {
  return said.state === "counted" ? `${formatAsIs(said.value)} ${plural}` : STATE_WORDS[said.state];
}
