import {
  type Check,
  counted,
  type Difference,
  differ,
  firstDifference,
  notChecked,
  type ReplayRun,
  verdict,
} from "./check.ts";
import { placesOf } from "./counts.ts";
import { nameOf } from "./declared.ts";

const TITLE = "Who went where is as the events say";

/** The last event that gave a cell to somebody, or took it back, agrees with the list. */
export function checkAssignments(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong(["cells-assigned"]);
  if (broken !== null) return [notChecked("assignments", TITLE, `Not compared: ${broken} is not whole.`)];
  const { assignments, visits } = run.record;
  const events = run.events.of("cells-assigned");
  if (events.length === 0 && assignments.length === 0) {
    return [notChecked("assignments", TITLE, "No cell was given to anybody.")];
  }
  const last = new Map<string, { member: string; day: string; at: string }>();
  for (const { payload, at } of events) {
    for (const unit of payload.units) {
      const key = `${payload.frameId} ${unit}`;
      if (payload.member === null) last.delete(key);
      else last.set(key, { member: payload.member, day: payload.day, at });
    }
  }
  const places = placesOf(run);
  const byVisit = new Map(assignments.map((one) => [one.visitId, one]));
  const difference = firstDifference([
    ...visits.map((visit) => (): Difference | null => {
      const expected = last.get(`${visit.frameId} ${visit.unit}`);
      const found = byVisit.get(visit.id);
      const where = places.get(visit.id) ?? visit.id;
      const name = (member: string | undefined): string | undefined => member && nameOf(run.record, member);
      return firstDifference([
        () => differ(`${where}, given to`, name(found?.member), name(expected?.member)),
        () => differ(`${where}, for the day`, found?.day, expected?.day),
        () => differ(`${where}, given at`, found?.assignedAt, expected?.at),
      ]);
    }),
    () => differ("cells given to somebody", assignments.length, byVisit.size),
  ]);
  return [verdict("assignments", TITLE, difference, `${counted(assignments.length, "cell")} given to somebody`)];
}
