import { type Check, type Difference, failed, notChecked, passed, type ReplayRun } from "./check.ts";
import { type Declared, declaredOf } from "./declared.ts";

const TITLE = "Frame sealed, draw declared, seed made, cells drawn: in this order";

interface Steps {
  readonly sealed: number[];
  readonly declared: number[];
  readonly seed: number[];
  readonly drawn: number[];
  readonly abandoned: number[];
  readonly withdrawn: number[];
}

/**
 * Rule R7, by the sequence of the events and not by clocks: the frame was sealed before the draw was declared, the
 * declaration before its seed, the seed before the draw; each once; and no second declaration was made while it was open or its draw was live.
 */
export function checkOrderOfProof(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong([
    "frame-sealed",
    "draw-declared",
    "seed-given",
    "draw-made",
    "draw-withdrawn",
    "declaration-abandoned",
  ]);
  if (broken !== null) return [notChecked("order", TITLE, `Not compared: ${broken} is not whole.`)];
  const all = declaredOf(run.record, run.events).map((one) => ({ one, steps: stepsOf(run, one) }));
  if (all.length === 0) return [notChecked("order", TITLE, "Nothing is declared yet.")];
  const difference =
    all.map(({ one, steps }) => orderDifference(one, steps)).find((found) => found !== null) ?? overlap(all);
  if (difference !== null) return [failed("order", TITLE, difference)];
  const stories = all.map(({ one, steps }) => `${one.name}: ${story(steps)}`);
  return [passed("order", TITLE, stories.join("; "))];
}

function stepsOf(run: ReplayRun, { stored }: Declared): Steps {
  const here = ({ payload }: { payload: { declarationId: string } }): boolean => payload.declarationId === stored.id;
  const sequences = (events: readonly { sequence: number }[]): number[] => events.map(({ sequence }) => sequence);
  const { events } = run;
  const drawn = events.of("draw-made").filter(here);
  // By the events alone: a draw that the list leaves out was still live.
  const draws = new Set(drawn.map(({ payload }) => payload.drawId));
  return {
    sealed: sequences(events.of("frame-sealed").filter(({ payload }) => payload.frameId === stored.frameId)),
    declared: sequences(events.of("draw-declared").filter(here)),
    seed: sequences(events.of("seed-given").filter(here)),
    drawn: sequences(drawn),
    abandoned: sequences(events.of("declaration-abandoned").filter(here)),
    withdrawn: sequences(events.of("draw-withdrawn").filter(({ payload }) => draws.has(payload.drawId))),
  };
}

function orderDifference({ name, stored, draw }: Declared, steps: Steps): Difference | null {
  const wanted: [string, number[], boolean][] = [
    ["the frame was sealed", steps.sealed, true],
    ["the draw was declared", steps.declared, true],
    ["the seed was given", steps.seed, stored.seed !== null],
    // A draw that the list leaves out is named by the check that all is told.
    ["the cells were drawn", steps.drawn, draw !== null || steps.drawn.length > 0],
    // What the list says of a withdrawal is compared by that check as well.
    ["the draw was withdrawn", steps.withdrawn, steps.withdrawn.length > 0],
    ["it was abandoned", steps.abandoned, stored.abandoned !== null],
  ];
  let before: { what: string; sequence: number } | null = null;
  for (const [what, sequences, expected] of wanted) {
    if (sequences.length !== (expected ? 1 : 0)) {
      const found = sequences.length === 0 ? "in no event" : `in event ${sequences.join(" and ")}`;
      return { where: `${name}, ${what}`, found, expected: expected ? "in one event" : "in none" };
    }
    const [sequence] = sequences;
    if (sequence === undefined) continue;
    if (before !== null && sequence < before.sequence) {
      const { what: earlier, sequence: place } = before;
      return {
        where: `${name}, ${what}`,
        found: `in event ${sequence}`,
        expected: `after event ${place}, in which ${earlier}`,
      };
    }
    before = { what, sequence };
  }
  return null;
}

/** A declaration that began while one before it was open or live: somebody could then choose between two. */
function overlap(told: readonly { one: Declared; steps: Steps }[]): Difference | null {
  const all = told.toSorted((a, b) => (a.steps.declared[0] ?? 0) - (b.steps.declared[0] ?? 0));
  for (const [place, { one, steps }] of all.entries()) {
    const [declared = 0] = steps.declared;
    for (const earlier of all.slice(0, place)) {
      if (earlier.one.stored.seasonId !== one.stored.seasonId) continue;
      const { drawn, abandoned, withdrawn } = earlier.steps;
      const isBefore = ([sequence]: readonly number[]): boolean => sequence !== undefined && sequence < declared;
      if (isBefore(drawn.length === 0 ? abandoned : withdrawn)) continue;
      const isLive = isBefore(drawn);
      return {
        where: `${one.name}, declared`,
        found: `in event ${declared}, while ${earlier.one.name} was ${isLive ? "live" : "open"}`,
        expected: isLive ? "one live draw a season: the earlier withdrawn first" : "one open declaration at a time",
      };
    }
  }
  return null;
}

function story({ sealed, declared, seed, drawn, abandoned, withdrawn }: Steps): string {
  const parts = [`sealed in event ${sealed[0] ?? 0}`, `declared in ${declared[0] ?? 0}`];
  if (seed[0] !== undefined) parts.push(`seed in ${seed[0]}`);
  if (drawn[0] !== undefined) parts.push(`drawn in ${drawn[0]}`);
  if (abandoned[0] !== undefined) parts.push(`abandoned in ${abandoned[0]}`);
  if (withdrawn[0] !== undefined) parts.push(`withdrawn in ${withdrawn[0]}`);
  return parts.join(", ");
}
