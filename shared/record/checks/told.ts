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

const TITLE = "Every declaration and draw is told";

/**
 * What the events tell of stands in the lists and the other way round: declarations, draws numbered without a gap,
 * what was withdrawn and abandoned, with reason, time and who.
 */
export function checkTold(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong(["draw-declared", "draw-made", "draw-withdrawn", "declaration-abandoned"]);
  if (broken !== null) return [notChecked("told", TITLE, `Not compared: ${broken} is not whole.`)];
  const { draws, declarations } = run.record;
  const difference = firstDifference([
    () => missing(run),
    ...draws.map((draw, place) => () => differ(`draw ${draw.number}, its number`, draw.number, place + 1)),
    ...draws.map((draw) => () => withdrawal(run, draw)),
    ...draws.map((draw) => () => useInSeason(run, draw)),
    ...declarations.map((stored, place) => () => abandonment(run, stored, place + 1)),
  ]);
  const withdrawn = draws.filter((draw) => draw.withdrawn !== null).length;
  const abandoned = declarations.filter((one) => one.abandoned !== null).length;
  const detail = [
    counted(declarations.length, "declaration"),
    counted(draws.length, "draw"),
    `${withdrawn} withdrawn`,
    `${abandoned} abandoned`,
  ];
  return [verdict("told", TITLE, difference, detail.join(", "))];
}

function missing(run: ReplayRun): Difference | null {
  const draws = new Set(run.record.draws.map(({ id }) => id));
  const declarations = new Set(run.record.declarations.map(({ id }) => id));
  const made = run.events.of("draw-made").find(({ payload }) => !draws.has(payload.drawId));
  if (made !== undefined) {
    return {
      where: "the list of draws",
      found: "none",
      expected: `draw ${made.payload.number} of event ${made.sequence}`,
    };
  }
  const declared = run.events.of("draw-declared").find(({ payload }) => !declarations.has(payload.declarationId));
  if (declared === undefined) return null;
  return {
    where: "the list of declarations",
    found: "none",
    expected: `the declaration of event ${declared.sequence}`,
  };
}

type Ending = { readonly reason: string; readonly at: string; readonly member: string } | null;

function withdrawal(run: ReplayRun, draw: ReplayRun["record"]["draws"][number]): Difference | null {
  const event = run.events.of("draw-withdrawn").find(({ payload }) => payload.drawId === draw.id);
  return endings(`draw ${draw.number}, withdrawn`, draw.withdrawn, event);
}

/** The season that took a draw when it was made, and let it go when it was withdrawn. */
function useInSeason(run: ReplayRun, draw: ReplayRun["record"]["draws"][number]): Difference | null {
  const stored = run.record.declarations.find(({ id }) => id === draw.declarationId);
  const taken = run.record.seasonDraws.find(({ drawId }) => drawId === draw.id);
  const where = `draw ${draw.number}`;
  return firstDifference([
    () => differ(`${where}, season that uses it`, taken?.seasonId, stored?.seasonId),
    () => differ(`${where}, in use from`, taken?.takenAt, draw.drawnAt),
    () => differ(`${where}, in use until`, taken?.endedAt ?? null, draw.withdrawn?.at ?? null),
  ]);
}

function abandonment(
  run: ReplayRun,
  stored: ReplayRun["record"]["declarations"][number],
  number: number,
): Difference | null {
  const event = run.events.of("declaration-abandoned").find(({ payload }) => payload.declarationId === stored.id);
  return endings(`declaration ${number}, abandoned`, stored.abandoned, event);
}

function endings(
  where: string,
  found: Ending,
  event: { readonly at: string; readonly member: string; readonly payload: { readonly reason: string } } | undefined,
): Difference | null {
  return firstDifference([
    () => differ(`${where}, reason`, found?.reason, event?.payload.reason),
    () => differ(`${where}, at`, found?.at, event?.at),
    () => differ(`${where}, by`, found?.member, event?.member),
  ]);
}
