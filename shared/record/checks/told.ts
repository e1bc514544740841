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

const TITLE = "Every area, frame, declaration and draw is told";

/**
 * What the events tell of stands in the lists: areas, frames, declarations and draws, these numbered without a gap;
 * what was withdrawn and abandoned, with reason, time and who; and each draw's use in its season, once.
 */
export function checkTold(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong([
    "area-imported",
    "frame-sealed",
    "draw-declared",
    "draw-made",
    "draw-withdrawn",
    "declaration-abandoned",
  ]);
  if (broken !== null) return [notChecked("told", TITLE, `Not compared: ${broken} is not whole.`)];
  const { areas, frames, draws, declarations } = run.record;
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
    counted(areas.length, "area"),
    counted(frames.length, "frame"),
    counted(declarations.length, "declaration"),
    counted(draws.length, "draw"),
    `${withdrawn} withdrawn`,
    `${abandoned} abandoned`,
  ].join(", ");
  return [verdict("told", TITLE, difference, `${detail}. ${elsewhere(run)}`)];
}

/** Rule R7: what the installation said of its other surveys; no event holds it, and no record can prove it. */
function elsewhere({ record }: ReplayRun): string {
  const { sameSource, sameFrame } = record.elsewhere;
  if (sameSource + sameFrame === 0)
    return "The installation tells of no other survey with this boundary file or frame.";
  const file = `${counted(sameSource, "other survey")} with the same boundary file`;
  return `The installation tells of ${file}, ${sameFrame} with the same frame: draws there are not in this record.`;
}

/** What an event tells of and its list leaves out. */
function missing({ record, events }: ReplayRun): Difference | null {
  return firstDifference([
    () =>
      leftOut("areas", record.areas, events.of("area-imported"), ({ areaId: id, number }) => ({
        id,
        name: `area ${number}`,
      })),
    () =>
      leftOut("frames", record.frames, events.of("frame-sealed"), ({ frameId: id, number }) => ({
        id,
        name: `frame ${number}`,
      })),
    () =>
      leftOut("draws", record.draws, events.of("draw-made"), ({ drawId: id, number }) => ({
        id,
        name: `draw ${number}`,
      })),
    () =>
      leftOut("declarations", record.declarations, events.of("draw-declared"), ({ declarationId: id }) => ({
        id,
        name: "the declaration",
      })),
  ]);
}

function leftOut<P>(
  name: string,
  list: readonly { readonly id: string }[],
  events: readonly { readonly sequence: number; readonly payload: P }[],
  thingOf: (payload: P) => { readonly id: string; readonly name: string },
): Difference | null {
  const listed = new Set(list.map(({ id }) => id));
  const event = events.find(({ payload }) => !listed.has(thingOf(payload).id));
  if (event === undefined) return null;
  const expected = `${thingOf(event.payload).name} of event ${event.sequence}`;
  return { where: `the list of ${name}`, found: "none", expected };
}

type Ending = { readonly reason: string; readonly at: string; readonly member: string } | null;

function withdrawal(run: ReplayRun, draw: ReplayRun["record"]["draws"][number]): Difference | null {
  const event = run.events.of("draw-withdrawn").find(({ payload }) => payload.drawId === draw.id);
  return endings(`draw ${draw.number}, withdrawn`, draw.withdrawn, event);
}

/** The season that took a draw when it was made, and let it go when it was withdrawn. */
function useInSeason(run: ReplayRun, draw: ReplayRun["record"]["draws"][number]): Difference | null {
  const stored = run.record.declarations.find(({ id }) => id === draw.declarationId);
  const rows = run.record.seasonDraws.filter(({ drawId }) => drawId === draw.id);
  const [taken] = rows;
  const where = `draw ${draw.number}`;
  return firstDifference([
    () => differ(`${where}, times that a season took it`, rows.length, 1),
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
