import { BEFORE_THE_FIRST } from "#shared/record/chain.ts";
import {
  type Check,
  counted,
  differ,
  type Difference,
  failed,
  firstDifference,
  passed,
  type ReplayRun,
  shown,
} from "./check.ts";

const TITLE = "The chain of events is unbroken";

/**
 * Rule R8: sequence from 1 without gaps, each envelope's hash its own, each envelope holding the hash of the one
 * before, all of this survey.
 */
export function checkChain(run: ReplayRun): Check[] {
  const { events, survey } = run.record;
  if (events.length === 0) {
    return [failed("chain", TITLE, { where: "events", found: "none", expected: "at least the survey's first event" })];
  }
  const brokenEnvelopes = new Map(
    run.events.broken.filter(({ part }) => part === "envelope").map(({ place, expected }) => [place, expected]),
  );
  for (const [place, event] of events.entries()) {
    const before = events[place - 1]?.sha256 ?? BEFORE_THE_FIRST;
    const where = `event ${event.envelope.sequence}`;
    const recomputed = brokenEnvelopes.get(place);
    const difference = firstDifference([
      () => differ(`the event in place ${place + 1}, its sequence`, event.envelope.sequence, place + 1),
      () => differ(`${where}, its survey`, event.envelope.survey, survey.id),
      () => (recomputed === undefined ? null : hashDifference(where, event.sha256, recomputed)),
      () => differ(`${where}, hash of the event before`, event.envelope.previous, before),
    ]);
    if (difference !== null) return [failed("chain", TITLE, difference)];
  }
  const newest = events.at(-1);
  return [
    passed(
      "chain",
      TITLE,
      `${counted(events.length, "event")}, the newest ${shown(newest?.sha256)}, in sequence without a gap`,
    ),
  ];
}

function hashDifference(where: string, found: string, expected: string): Difference {
  return { where: `${where}, hash of its envelope`, found: shown(found), expected: shown(expected) };
}
