import { entriesInUse } from "#shared/field/in-use.ts";
import { Problem } from "#shared/problem.ts";
import {
  type Check,
  counted,
  differ,
  type Difference,
  failed,
  firstDifference,
  notChecked,
  type ReplayRun,
  verdict,
} from "./check.ts";
import { type Declared, declaredOf, type StoredDraw } from "./declared.ts";
import { type ActOfEvent, type ListStanding, listsStanding } from "./standing.ts";

const TITLE = "Reserves were opened in order";

/**
 * Rule R6: what each closing closed, opened and passed over is what the list gives, in draw order; so nobody chose a cell.
 * And the acts in the list are those of the events.
 */
export function checkReserves(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong(["pick-closed", "count-amended", "draw-made"]);
  if (broken !== null) return [notChecked("reserves", TITLE, `Not compared: ${broken} is not whole.`)];
  const drawn = declaredOf(run.record, run.events).flatMap((one) =>
    one.draw === null ? [] : [{ ...one, draw: one.draw }],
  );
  if (drawn.length === 0) return [notChecked("reserves", TITLE, "No cells are drawn yet.")];
  let opened = 0;
  let closings = 0;
  for (const one of drawn) {
    if (!Array.isArray(run.lists.get(one.stored.id))) {
      return [notChecked("reserves", TITLE, `The list of ${one.name} could not be made again.`)];
    }
    const standing = standingOf(run, one);
    if (standing instanceof Problem) {
      return [
        failed("reserves", TITLE, { where: one.name, found: "a closing", expected: `none: ${standing.message}` }),
      ];
    }
    const difference = firstDifference([
      ...standing.map((list) => () => closingsDifference(one.name, list)),
      () => actsDifference(run, one, standing),
    ]);
    if (difference !== null) return [failed("reserves", TITLE, difference)];
    opened += standing.reduce((sum, { use }) => sum + use.opened.length, 0);
    closings += standing.reduce((sum, { acts }) => sum + acts.filter(({ act }) => act.kind === "close").length, 0);
  }
  const detail = `${counted(closings, "cell")} closed, ${counted(opened, "reserve")} opened`;
  return [verdict("reserves", TITLE, null, closings + opened === 0 ? "none opened" : detail)];
}

function standingOf(run: ReplayRun, one: Declared & { readonly draw: StoredDraw }): ListStanding[] | Problem {
  try {
    return listsStanding(run, one);
  } catch (error) {
    if (error instanceof Problem && error.code !== "cancelled") return error;
    throw error;
  }
}

/** Each closing's event names the positions that the list gives. */
function closingsDifference(name: string, { entries, picks, acts }: ListStanding): Difference | null {
  const before = acts.map(({ act }) => act);
  for (const [place, { act, event }] of acts.entries()) {
    if (!("drawId" in event.payload) || act.kind !== "close") continue;
    const was = entriesInUse(entries, picks, before.slice(0, place));
    const is = entriesInUse(entries, picks, before.slice(0, place + 1));
    const known = new Set(was.passedOver.map(({ position }) => position));
    const { closed, opened, passedOver } = event.payload;
    const where = `${name}, cell of unit ${act.unit} closed in event ${event.sequence}`;
    const positions = (list: readonly number[]): string => (list.length === 0 ? "none" : list.join(", "));
    const difference = firstDifference([
      () =>
        differ(
          `${where}, picks closed`,
          positions(closed),
          positions(was.inUse.filter(({ unit }) => unit === act.unit).map(({ position }) => position)),
        ),
      () =>
        differ(
          `${where}, reserves opened`,
          positions(opened),
          positions(is.opened.slice(was.opened.length).map(({ position }) => position)),
        ),
      () =>
        differ(
          `${where}, reserves passed over`,
          positions(passedOver),
          positions(is.passedOver.map(({ position }) => position).filter((position) => !known.has(position))),
        ),
    ]);
    if (difference !== null) return difference;
  }
  return null;
}

/** The list of acts holds what the events say, in their order. */
function actsDifference(
  run: ReplayRun,
  { name, stored, draw }: Declared & { readonly draw: StoredDraw },
  standing: readonly ListStanding[],
): Difference | null {
  const expected = standing.flatMap(({ acts }) => acts).toSorted((a, b) => a.event.sequence - b.event.sequence);
  const found = run.record.pickActs
    .filter(({ drawId, seasonId }) => drawId === draw.id && seasonId === stored.seasonId)
    .toSorted((a, b) => a.sequence - b.sequence);
  for (const [place, one] of expected.entries()) {
    const act = found[place];
    const where = `${name}, act ${place + 1}`;
    const difference = firstDifference([
      () => differ(`${where}, its number`, act?.sequence, place + 1),
      () => differ(`${where}, what it is`, act?.kind, one.act.kind),
      () => differ(`${where}, stratum`, act?.stratum, one.stratum),
      () => differ(`${where}, unit`, act?.unit, one.act.unit),
      () => differ(`${where}, state`, act?.state, stateOf(one)),
      () => differ(`${where}, reason`, act?.reason, one.event.payload.reason),
      () => differ(`${where}, at`, act?.at, one.event.at),
      () => differ(`${where}, by`, act?.member, one.event.member),
    ]);
    if (difference !== null) return difference;
  }
  return differ(`${name}, number of acts`, found.length, expected.length);
}

function stateOf({ act, event }: ActOfEvent): string | null {
  return act.kind === "reopen" ? null : event.payload.state;
}
