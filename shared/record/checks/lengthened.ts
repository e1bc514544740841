import { entriesSha256 } from "#shared/draw/entries-hash.ts";
import type { DrawEntries } from "#shared/draw/draw.ts";
import { differ, type Difference, firstDifference, type ReplayRun } from "./check.ts";
import type { Declared, StoredDraw } from "./declared.ts";
import type { WholeEvent } from "./record-events.ts";
import { listsStanding } from "./standing.ts";

/**
 * Rule R6: a draw's lists are as long as they were declared, and longer only by events that lengthened them, each by the
 * same stream, and no further than the act that follows it opened entries.
 */
export function lengtheningDifference(
  run: ReplayRun,
  declared: Declared & { readonly draw: StoredDraw },
  again: DrawEntries,
): Difference | null {
  if (run.events.brokenAmong(["list-lengthened", "draw-made", "pick-closed", "count-amended"]) !== null) return null;
  return firstDifference(again.map((list) => () => inList(run, declared, list)));
}

function inList(
  run: ReplayRun,
  declared: Declared & { readonly draw: StoredDraw },
  { stratum, entries }: DrawEntries[number],
): Difference | null {
  const { draw, value } = declared;
  const where = `draw ${draw.number}${stratum === "" ? "" : `, stratum ${stratum}`}`;
  const events = run.events
    .of("list-lengthened")
    .filter(({ payload }) => payload.drawId === draw.id && payload.stratum === stratum);
  const declaredLength = entries.filter(({ reserve }) => !reserve).length + (value?.reserves ?? 0);
  let length = declaredLength;
  for (const event of events) {
    const { from, to } = event.payload;
    const there = `${where}, list lengthened in event ${event.sequence}`;
    const hash = entriesSha256(entries.slice(0, to).map((entry) => ({ stratum, ...entry })));
    const difference = firstDifference([
      () => differ(`${there}, entries before`, from, length),
      () => differ(`${there}, hash of its entries`, event.payload.entriesSha256, hash),
      () => differ(`${there}, entries after`, to, openedTo(run, declared, stratum, event)),
    ]);
    if (difference !== null) return difference;
    length = to;
  }
  return differ(`${where}, number of entries`, entries.length, length);
}

/** Up to where the act that follows a lengthening opened the list. */
function openedTo(
  run: ReplayRun,
  declared: Declared & { readonly draw: StoredDraw },
  stratum: string,
  { sequence }: WholeEvent<"list-lengthened">,
): number | undefined {
  return listsStanding(run, declared, sequence + 1).find((list) => list.stratum === stratum)?.use.openedTo;
}
