import { unitAt } from "#shared/frame/list.ts";
import { Problem } from "#shared/problem.ts";
import {
  type Check,
  counted,
  differ,
  type Difference,
  firstDifference,
  notChecked,
  type ReplayRun,
  verdict,
} from "./check.ts";
import { placesOf } from "./counts.ts";
import { declaredOf } from "./declared.ts";
import { listsStanding } from "./standing.ts";

const TITLE = "The cells to visit are those of the draws";

/**
 * Every visit is of a cell that a draw put in use, opened when it was drawn or when a reserve was opened, at its column
 * and row of the frame; and every such cell has a visit.
 */
export function checkVisits(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong(["draw-made", "pick-closed", "count-amended"]);
  if (broken !== null) return [notChecked("visits", TITLE, `Not compared: ${broken} is not whole.`)];
  const opened = openedUnits(run);
  if (opened === null) return [notChecked("visits", TITLE, "The lists of the draws could not be made again.")];
  if (opened.size === 0 && run.record.visits.length === 0)
    return [notChecked("visits", TITLE, "No cells are drawn yet.")];
  const places = placesOf(run);
  const difference = firstDifference([
    ...run.record.visits.map((visit) => (): Difference | null => {
      const where = places.get(visit.id) ?? `unit ${visit.unit}`;
      const key = keyOf(visit.seasonId, visit.frameId, visit.unit);
      const at = opened.get(key);
      opened.delete(key);
      if (at === undefined) return { where, found: "a visit", expected: "none: no draw put it in use" };
      return firstDifference([
        () => differ(`${where}, opened at`, visit.openedAt, at),
        () => placeDifference(run, visit, where),
      ]);
    }),
    (): Difference | null => {
      const [missing] = opened.keys();
      return missing === undefined
        ? null
        : { where: `unit ${missing.split(" ")[2] ?? ""}`, found: "no visit", expected: "one: a draw put it in use" };
    },
  ]);
  return [verdict("visits", TITLE, difference, counted(run.record.visits.length, "cell"))];
}

const keyOf = (season: string, frame: string, unit: number): string => `${season} ${frame} ${unit}`;

/** When each cell was first put in use, by season, frame and unit; null where a list could not be made again. */
function openedUnits(run: ReplayRun): Map<string, string> | null {
  const opened = new Map<string, string>();
  for (const { stored, draw, ...rest } of declaredOf(run.record, run.events)) {
    if (draw === null) continue;
    if (!Array.isArray(run.lists.get(stored.id))) return null;
    const made = run.events.of("draw-made").find(({ payload }) => payload.drawId === draw.id);
    const put = (unit: number, at: string): void => {
      const key = keyOf(stored.seasonId, draw.frameId, unit);
      const known = opened.get(key);
      if (known === undefined || at < known) opened.set(key, at);
    };
    try {
      for (const { entries, picks, use, acts } of listsStanding(run, { ...rest, stored, draw })) {
        for (const { unit } of entries.slice(0, picks)) put(unit, made?.at ?? draw.drawnAt);
        for (const { position, because } of use.opened) {
          const closing = acts.find(
            ({ act }) => act.kind === "close" && act.unit === entries[(because ?? 0) - 1]?.unit,
          );
          const unit = entries[position - 1]?.unit;
          if (unit !== undefined) put(unit, closing?.event.at ?? draw.drawnAt);
        }
      }
    } catch (error) {
      if (error instanceof Problem && error.code !== "cancelled") return null;
      throw error;
    }
  }
  return opened;
}

function placeDifference(
  run: ReplayRun,
  visit: ReplayRun["record"]["visits"][number],
  where: string,
): Difference | null {
  const cells = run.frames.get(visit.frameId)?.cells;
  if (cells === undefined || cells === null) return null;
  const { column, row } = unitAt(cells, visit.unit);
  return firstDifference([
    () => differ(`${where}, column`, visit.column, column),
    () => differ(`${where}, row`, visit.row, row),
  ]);
}
