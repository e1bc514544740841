import { expect, test, vi } from "vitest";
import type { Check } from "#shared/record/checks/check.ts";
import type { RecordFile } from "#shared/record/record-file.ts";
import { replay } from "#shared/record/replay.ts";
import { goodRecord } from "../../fixtures/record.ts";
import { type Act, type Draft, PLANNER } from "../../fixtures/record-base.ts";

vi.setConfig({ testTimeout: 30_000 });

/** Records whose hashes all hold, while a list holds more, less or something else than the events tell. */
function only(change: (draft: Draft) => void): Check {
  const failed = replay(goodRecord(change)).checks.filter(({ outcome }) => outcome === "failed");
  const [check] = failed;
  if (check === undefined || failed.length > 1) throw new Error(`one check, not: ${failed.map(({ id }) => id).join()}`);
  return check;
}

const onlyIn = (change: (record: RecordFile) => void): Check =>
  only(({ record }) => {
    change(record);
  });

function found<T>(item: T | undefined): T {
  if (item === undefined) throw new Error("not there");
  return item;
}

const actOf = ({ acts }: Draft, kind: Act["kind"], place = 0): Act => found(acts.filter((a) => a.kind === kind)[place]);

// The list then gives each of the two cells the other's number; the events name visit and unit together.
test("two visits that were given each other's ids are named by the unit of the count's event", () => {
  let units: number[] = [];
  const check = onlyIn((record) => {
    const [one, other] = record.visits
      .filter(({ id }) => !record.assignments.some(({ visitId }) => visitId === id))
      .filter(({ id }) => record.counts.some((count) => count.visitId === id));
    const [first, second] = [found(one), found(other)];
    [first.id, second.id] = [second.id, first.id];
    units = [first.unit, second.unit];
  });
  expect(check.id).toBe("counts");
  expect(check.difference?.where).toMatch(/, unit of the visit$/);
  expect(units).toContain(Number(check.difference?.found));
  expect(check.difference?.expected).toMatch(/^\d+, as event \d+ says$/);
});

test("a count event of another frame than its visit's is named", () => {
  const check = only((draft) => {
    const { payload } = found(draft.acts.filter(({ kind }) => kind === "count-entered").at(0));
    payload["frameId"] = "frame-9";
    draft.record.estimates.pop();
    draft.acts.pop();
  });
  expect(check).toMatchObject({ id: "counts", difference: { found: '"frame-1"' } });
  expect(check.difference?.where).toMatch(/, frame of the visit$/);
});

// Draw 1 is withdrawn only after draw 2 was declared: for a while the season had two to choose from.
test("a draw that was declared while an earlier one of its season was live is named", () => {
  const check = only((draft) => {
    const withdrawn = actOf(draft, "draw-withdrawn");
    draft.acts.splice(draft.acts.indexOf(withdrawn), 1);
    draft.acts.splice(draft.acts.indexOf(actOf(draft, "draw-made", 1)), 0, withdrawn);
  });
  expect(check.id).toBe("order");
  expect(check.detail).toContain("while draw 1 was live; expected one live draw a season");
});

test("a draw that was withdrawn before it was drawn is named", () => {
  const check = only((draft) => {
    const withdrawn = actOf(draft, "draw-withdrawn");
    draft.acts.splice(draft.acts.indexOf(withdrawn), 1);
    draft.acts.splice(draft.acts.indexOf(actOf(draft, "draw-made")), 0, withdrawn);
  });
  expect(check).toMatchObject({ id: "order", difference: { where: "draw 1, the draw was withdrawn" } });
});

test("a sealed frame that the list leaves out is named by its event", () => {
  const check = only((draft) => {
    const act = actOf(draft, "frame-sealed");
    draft.acts.push({ ...act, payload: { ...act.payload, frameId: "frame-2", number: 2 } });
  });
  expect(check).toMatchObject({ id: "told", difference: { where: "the list of frames", found: "none" } });
  expect(check.difference?.expected).toMatch(/^frame 2 of event \d+$/);
});

test("an imported area that the list leaves out is named by its event", () => {
  const check = only((draft) => {
    const act = actOf(draft, "area-imported");
    draft.acts.push({ ...act, payload: { ...act.payload, areaId: "area-2", number: 2 } });
  });
  expect(check).toMatchObject({ id: "told", difference: { where: "the list of areas", found: "none" } });
  expect(check.difference?.expected).toMatch(/^area 2 of event \d+$/);
});

test("a second target, which no event gives, is named", () => {
  const check = onlyIn(({ survey }) => {
    survey.targets.push({ ...found(survey.targets[0]), id: "target-2", singular: "nest" });
  });
  expect(check).toMatchObject({
    id: "survey",
    difference: { where: "survey, its targets", found: '"burrow, nest"', expected: '"burrow"' },
  });
});

test("a second season, which no event gives, is named", () => {
  const check = onlyIn(({ survey }) => {
    survey.seasons.push({ id: "season-2", name: "2032", startsOn: null, endsOn: null });
  });
  expect(check).toMatchObject({
    id: "survey",
    difference: { where: "survey, its seasons", found: '"2031, 2032"', expected: '"2031"' },
  });
});

test.each(["startsOn", "endsOn"] as const)("a day of the season (%s) that no event gives is named", (day) => {
  const check = onlyIn(({ survey }) => {
    found(survey.seasons[0])[day] = "2031-05-01";
  });
  expect(check).toMatchObject({
    id: "survey",
    difference: { where: `season 2031, ${day}`, found: '"2031-05-01"', expected: "nothing" },
  });
});

test("a draw that stands twice in the season's draws is named", () => {
  const check = onlyIn(({ seasonDraws }) => {
    seasonDraws.push({ ...found(seasonDraws[0]), id: "another", takenAt: "2031-05-09T08:00:00.000Z" });
  });
  expect(check).toMatchObject({
    id: "told",
    difference: { where: "draw 1, times that a season took it", found: "2", expected: "1" },
  });
});

test("a draw made and then named abandoned is still live for the next declaration", () => {
  const report = replay(
    goodRecord((draft) => {
      const { acts, record } = draft;
      acts.splice(acts.indexOf(actOf(draft, "draw-withdrawn")), 1);
      found(record.draws[0]).withdrawn = null;
      found(record.seasonDraws[0]).endedAt = null;
      const at = found(record.declarations[1]).declaredAt;
      const payload = { version: 1, declarationId: "declaration-1", reason: "none" };
      acts.splice(acts.indexOf(actOf(draft, "draw-declared", 1)), 0, {
        at,
        member: PLANNER,
        kind: "declaration-abandoned",
        payload,
      });
      found(record.declarations[0]).abandoned = { reason: "none", at, member: PLANNER };
    }),
  );
  const check = report.checks.find(({ id }) => id === "order");
  expect(check?.detail).toContain("while draw 1 was live");
});

test("a cell that is given twice is named", () => {
  const check = onlyIn(({ assignments }) => {
    assignments.unshift({ ...found(assignments[0]), member: found(assignments[0]).member, day: "Tuesday" });
  });
  expect(check).toMatchObject({
    id: "assignments",
    difference: { where: "cells given to somebody", found: "2", expected: "1" },
  });
});

/** An act after all others. */
function act({ acts }: Draft, kind: Act["kind"], payload: Record<string, unknown>): void {
  acts.push({ at: "2031-05-28T08:00:00.000Z", member: PLANNER, kind, payload: { version: 1, ...payload } });
}

/** The settings as the good record began with them, and as they are after a change that every list follows. */
function changeSettings(draft: Draft): { before: object; after: object } {
  const { survey } = draft.record;
  const [season] = survey.seasons;
  const of = (name: string, level: string, startsOn: string | null) => ({
    ...{ name, timeZone: survey.timeZone, level, sensitivity: "open", safetyNotes: "", targets: survey.targets },
    season: { ...found(season), startsOn },
  });
  const before = of("Tolve Field", "0.95", null);
  const after = of("Tolve Meadow", "0.9", "2031-04-01");
  Object.assign(survey, { name: "Tolve Meadow", level: "0.9" });
  found(season).startsOn = "2031-04-01";
  return { before, after };
}

test("settings that were changed by an event pass, and how often is told", () => {
  const report = replay(goodRecord((draft) => act(draft, "settings-changed", changeSettings(draft))));
  expect(report.checks.filter(({ outcome }) => outcome === "failed")).toEqual([]);
  const told = report.checks.find(({ id }) => id === "survey")?.detail;
  expect(told).toBe("Tolve Meadow; burrows; 3 people; settings changed 1 time");
});

test("a change of the settings that begins with others than those in force is named", () => {
  const check = only((draft) => {
    const { before, after } = changeSettings(draft);
    act(draft, "settings-changed", { before: { ...before, level: "0.8" }, after });
  });
  expect(check).toMatchObject({ id: "survey", difference: { found: '"0.8"', expected: '"0.95"' } });
  expect(check.difference?.where).toMatch(/^settings before event \d+, level$/);
});

test("somebody whose role was ended has it no more, and is still named", () => {
  const ended = { member: PLANNER, name: "Paula Planner", role: "planner" };
  const kept = only((draft) => act(draft, "role-ended", ended));
  expect(kept).toMatchObject({ id: "survey", difference: { where: "Paula Planner, roles", found: '"planner"' } });
  const report = replay(
    goodRecord((draft) => {
      act(draft, "role-ended", ended);
      found(draft.record.people.find(({ member }) => member === PLANNER)).roles = [];
    }),
  );
  expect(report.summary.failed).toBe(0);
});

test("a name that was changed by an event is the one that holds", () => {
  const renamed = { member: PLANNER, before: "Paula Planner", after: "Paula Pym" };
  const check = only((draft) => act(draft, "member-renamed", renamed));
  expect(check.difference).toMatchObject({ found: '"Paula Planner"', expected: '"Paula Pym"' });
  const report = replay(
    goodRecord((draft) => {
      act(draft, "member-renamed", renamed);
      found(draft.record.people.find(({ member }) => member === PLANNER)).name = "Paula Pym";
    }),
  );
  expect(report.summary.failed).toBe(0);
});
