import type { RecordFile } from "#shared/record/record-file.ts";
import { type Check, counted, type Difference, firstDifference, notChecked, type ReplayRun, verdict } from "./check.ts";
import { placesOf, said } from "./counts.ts";

type StoredCount = RecordFile["counts"][number];

const TITLE = "Every amendment keeps the old value, who, when and why";

/**
 * An amendment names the entry that it takes the place of, which stays in the list; it has a reason; each entry is
 * replaced at most once; and a cell has one first count a target.
 */
export function checkAmendments(run: ReplayRun): Check[] {
  const { counts } = run.record;
  const amendments = counts.filter(({ replaces }) => replaces !== null);
  if (counts.length === 0) return [notChecked("amendments", TITLE, "Nothing is counted yet.")];
  const places = placesOf(run);
  const where = (count: StoredCount): string => places.get(count.visitId) ?? `visit ${count.visitId}`;
  const byId = new Map(counts.map((count) => [count.id, count]));
  const difference = firstDifference([
    ...amendments.map((count) => () => amendmentDifference(where(count), count, byId)),
    () => twice(counts, where),
  ]);
  const stories = amendments.slice(0, 5).map((count) => {
    const old = byId.get(count.replaces ?? "");
    return `${where(count)} from ${old === undefined ? "nothing" : said(old)} to ${said(count)}: “${count.reason}”`;
  });
  const more = amendments.length > stories.length ? " …" : "";
  const detail = [counted(amendments.length, "amendment"), ...stories].join("; ");
  return [verdict("amendments", TITLE, difference, detail + more)];
}

function amendmentDifference(
  where: string,
  count: StoredCount,
  byId: ReadonlyMap<string, StoredCount>,
): Difference | null {
  const old = byId.get(count.replaces ?? "");
  if (old === undefined) {
    return { where, found: `${said(count)} in place of an entry that is not here`, expected: "the old value kept" };
  }
  if (old.visitId !== count.visitId || old.targetId !== count.targetId) {
    return { where, found: "an amendment of another cell's or target's count", expected: "one of the same" };
  }
  if (count.reason.trim() !== "") return null;
  return { where, found: `${said(old)} amended to ${said(count)} without a reason`, expected: "a reason" };
}

function twice(counts: readonly StoredCount[], where: (count: StoredCount) => string): Difference | null {
  const replaced = new Set<string>();
  const first = new Set<string>();
  for (const count of counts) {
    if (count.replaces !== null) {
      if (replaced.has(count.replaces)) {
        return { where: where(count), found: "two amendments of one entry", expected: "one after the other" };
      }
      replaced.add(count.replaces);
    } else if (count.purpose === "first") {
      const key = `${count.visitId} ${count.targetId}`;
      if (first.has(key)) return { where: where(count), found: "two first counts", expected: "one" };
      first.add(key);
    }
  }
  return null;
}
