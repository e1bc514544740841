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
