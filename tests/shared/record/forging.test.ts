import { describe, expect, test, vi } from "vitest";
import { canonicalSha256 } from "#shared/record/chain.ts";
import type { Check } from "#shared/record/checks/check.ts";
import type { RecordFile } from "#shared/record/record-file.ts";
import { replay } from "#shared/record/replay.ts";
import { draftRecord, goodRecord, keepEstimate } from "../../fixtures/record.ts";
import { type Act, type Draft, type Forge, SOURCE_FILE } from "../../fixtures/record-base.ts";
import { sealed } from "../../fixtures/record-sealing.ts";

vi.setConfig({ testTimeout: 30_000 });

/**
 * Records that are whole: every hash and signature holds, because they were made by somebody who has the key. What they
 * tell cannot have happened by the rules, and that is what must be named.
 */
function failed(change: (draft: Draft) => void, forge: Forge = {}): Check[] {
  return failedIn(goodRecord(change, forge));
}

function failedIn(record: RecordFile): Check[] {
  return replay(record).checks.filter(({ outcome }) => outcome === "failed");
}

const ids = (checks: readonly Check[]): string[] => checks.map(({ id }) => id);

function only(checks: readonly Check[]): Check {
  const [check] = checks;
  if (check === undefined || checks.length > 1) throw new Error(`one check, not: ${ids(checks).join(", ")}`);
  return check;
}

function found<T>(item: T | undefined): T {
  if (item === undefined) throw new Error("not there");
  return item;
}

const actOf = ({ acts }: Draft, kind: Act["kind"], place = 0): Act => found(acts.filter((a) => a.kind === kind)[place]);

/** Puts one act in front of another. */
function moveBefore(draft: Draft, moved: Act, other: Act): void {
  draft.acts.splice(draft.acts.indexOf(moved), 1);
  draft.acts.splice(draft.acts.indexOf(other), 0, moved);
}

describe("the order of proof", () => {
  test("a seed that was known before the draw was declared is named", () => {
    const check = only(
      failed((draft) => {
        moveBefore(draft, actOf(draft, "seed-given", 2), actOf(draft, "draw-declared", 2));
      }),
    );
    expect(check.id).toBe("order");
    expect(check.detail).toContain("draw 2, the seed was given: the record says in event 14; expected after event 15");
  });

  test("a frame that was sealed after its draw was declared is named", () => {
    const checks = failed((draft) => {
      moveBefore(draft, actOf(draft, "draw-declared"), actOf(draft, "frame-sealed"));
    });
    expect(ids(checks)).toEqual(["order"]);
  });

  test("a second declaration beside an open one is named", () => {
    const check = only(
      failed((draft) => {
        moveBefore(draft, actOf(draft, "draw-declared", 2), actOf(draft, "declaration-abandoned"));
      }),
    );
    expect(check.detail).toContain("while declaration 2 was open");
  });

  test("a second seed for one declaration is named", () => {
    const checks = failed((draft) => {
      const given = actOf(draft, "seed-given", 2);
      draft.acts.splice(draft.acts.indexOf(given), 0, { ...given, payload: { ...given.payload, seed: "again" } });
    });
    expect(ids(checks)).toEqual(["order", "seed-3"]);
    expect(found(checks[0]).difference).toMatchObject({
      where: "draw 2, the seed was given",
      found: "in event 15 and 16",
      expected: "in one event",
    });
  });
});

describe("the frame", () => {
  // A zigzag over the first ring's second and third corner: the edges 1–2 and 3–4 then cross.
  test("rings that cross are named with the place", () => {
    const { record, acts } = draftRecord({
      statement: (made) => {
        const rings = structuredClone(made.rings);
        const outer = found(rings[0]?.[0]);
        [outer[1], outer[2]] = [found(outer[2]), found(outer[1])];
        return { ...made, rings };
      },
    });
    const checks = failedIn({ ...record, events: sealed(acts) });
    expect(ids(checks)).toContain("frame-1-rings");
    expect(found(checks.find(({ id }) => id === "frame-1-rings")).detail).toMatch(/two edges that meet at -?\d+/);
  });

  test("a list that does not follow from the rings is named", () => {
    const check = only(failed(() => undefined, { statement: (made) => ({ ...made, listSha256: "ab".repeat(32) }) }));
    expect(check).toMatchObject({ id: "frame-1-list", difference: { where: "frame 1, hash of the list" } });
  });

  test("a boundary that was moved by two centimetres does not follow from the file", () => {
    const moved = goodRecord(() => undefined, {
      statement: (made) => {
        const rings = structuredClone(made.rings);
        const corner = found(rings[0]?.[0]?.[0]);
        corner[0] += 20;
        return { ...made, rings };
      },
    });
    const report = replay(moved, { sourceFile: SOURCE_FILE });
    const check = found(report.checks.find(({ id }) => id === "frame-1-source"));
    expect(check.outcome).toBe("failed");
    expect(check.detail).toMatch(
      /an edge of the file at \d+ mm east, \d+ mm north: the record says the nearest ring 20 mm away/,
    );
  });

  test("rings within ten millimetres of the file's edges pass", () => {
    const moved = goodRecord(() => undefined, {
      statement: (made) => {
        const rings = structuredClone(made.rings);
        const corner = found(rings[0]?.[0]?.[0]);
        corner[0] += 3;
        return { ...made, rings };
      },
    });
    const check = replay(moved, { sourceFile: SOURCE_FILE }).checks.find(({ id }) => id === "frame-1-source");
    expect(check).toMatchObject({
      outcome: "passed",
      detail: "9 vertices in whole millimetres, within 10 mm of the file's edges both ways",
    });
  });
});

describe("draws, reserves and counts", () => {
  test("a nicer cell in place of a drawn one is named, though its event was forged with it", () => {
    const checks = failed((draft) => {
      const draw = found(draft.record.draws[1]);
      const entry = found(draw.lists[0]?.entries[3]);
      entry.unit = entry.unit === 1 ? 2 : 1;
    });
    expect(ids(checks)).toEqual(["draw-2"]);
    expect(only(checks).detail).toContain("draw 2, entry 4, unit");
  });

  test("a reserve that was opened out of order is named", () => {
    const check = only(
      failed((draft) => {
        const { payload } = actOf(draft, "pick-closed");
        payload["opened"] = (payload["opened"] as number[]).toReversed();
      }),
    );
    expect(check.id).toBe("reserves");
    expect(check.detail).toContain("reserves opened");
  });

  test("a cell that was closed though no pick in use was of it is named", () => {
    const checks = failed((draft) => {
      const used = new Set(draft.record.draws[1]?.lists[0]?.entries.map(({ unit }) => unit));
      const free = Array.from({ length: 33 }, (_, place) => place + 1).find((unit) => !used.has(unit));
      actOf(draft, "pick-closed").payload["unit"] = free;
    });
    expect(ids(checks)).toContain("reserves");
  });

  test("an amendment without a reason is named", () => {
    const check = only(
      failed((draft) => {
        actOf(draft, "count-amended").payload["reason"] = "";
        found(draft.record.counts.at(-1)).reason = "";
      }),
    );
    expect(check.id).toBe("amendments");
    expect(check.detail).toContain("6 amended to 5 without a reason");
  });

  test("an amendment whose old value is gone is named", () => {
    const check = only(
      failed((draft) => {
        actOf(draft, "count-amended").payload["replaces"] = "count-99";
        found(draft.record.counts.at(-1)).replaces = "count-99";
      }).filter(({ id }) => !id.startsWith("estimate") && id !== "current-estimate"),
    );
    expect(check.id).toBe("amendments");
  });
});

describe("estimates", () => {
  test("an estimate that the counts do not give is named with both numbers", () => {
    const check = only(
      failed((draft) => {
        const kept = found(draft.record.estimates[0]);
        const mean = kept.result["mean"] as { estimate: number };
        mean.estimate = 3.5;
        actOf(draft, "estimate-kept").payload["resultSha256"] = canonicalSha256(kept.result);
      }),
    );
    expect(check).toMatchObject({ id: "estimate-1", difference: { where: "mean, estimate", found: "3.5" } });
  });

  // 12 picks; the amended cell holds one less, so the sum and with it the mean times 12 fall by one a pick of that cell.
  test("an estimate that is older than an amendment no longer follows, and the amendment is told", () => {
    const check = only(
      failed((draft) => {
        const old = found(draft.record.counts.findLast(({ value }) => value === 5));
        const at = "2031-05-28T09:00:00.000Z";
        const reason = "seen on the photo";
        const changedTo = { state: "counted", value: 4, replaces: old.id, reason, note: "" } as const;
        const same = {
          visitId: old.visitId,
          targetId: old.targetId,
          observer: old.observer,
          purpose: "first",
        } as const;
        const madeAt = at;
        const unit = Number(old.visitId.replace("visit-", ""));
        const payload = {
          version: 1,
          entryId: "late",
          frameId: "frame-1",
          unit,
          ...same,
          ...changedTo,
          madeAt,
          importId: null,
        };
        draft.acts.push({ at, member: "member-lead", kind: "count-amended", payload });
        draft.record.counts.push({
          id: "late",
          ...same,
          ...changedTo,
          importId: null,
          enteredBy: "member-lead",
          enteredAt: at,
          madeAt,
        });
      }),
    );
    expect(check.id).toBe("current-estimate");
    expect(check.detail).toContain("amended from 5: “seen on the photo”");
    expect(check.detail).toContain("The estimate of event 31 is older than that.");
  });

  test("an estimate that was kept again after the amendment passes", () => {
    expect(failed((draft) => keepEstimate(draft))).toEqual([]);
  });

  test("an estimate that the list leaves out is named by its event", () => {
    expect(ids(failed((draft) => draft.record.estimates.pop()))).toEqual(["estimates"]);
  });
});

test("a chain that was written anew holds by itself and fails against a hash that was held", () => {
  const first = goodRecord();
  const held = found(first.events[9]).sha256;
  const anew = goodRecord((draft) => {
    actOf(draft, "cells-assigned").payload["day"] = "Tuesday";
    found(draft.record.assignments[0]).day = "Tuesday";
    actOf(draft, "survey-created").payload["name"] = "Other Field";
    draft.record.survey.name = "Other Field";
  });
  expect(failedIn(anew)).toEqual([]);
  const { checks } = replay(anew, { heldHashes: [held] });
  expect(ids(checks.filter(({ outcome }) => outcome === "failed"))).toEqual(["held-hashes"]);
});

describe("a list that ran short", () => {
  const short = { reserves: 1 };
  const lengthening = (draft: Draft) => actOf(draft, "list-lengthened");

  // R6: draw 2 has one reserve, and it falls on the closed cell, which was picked twice: two more entries open.
  test("is lengthened by the same stream, and every check passes", () => {
    expect(failed(() => undefined, short)).toEqual([]);
  });

  test("a list that is longer than its events say is named", () => {
    const check = only(failed((draft) => draft.acts.splice(draft.acts.indexOf(lengthening(draft)), 1), short));
    expect(check.id).toBe("draw-2");
    expect(check.detail).toContain("draw 2, number of entries: the record says 15; expected 13");
  });

  test("another stream's entries are named by their hash", () => {
    const check = only(
      failed((draft) => {
        lengthening(draft).payload["entriesSha256"] = "0".repeat(64);
      }, short),
    );
    expect(check.detail).toContain("hash of its entries");
  });

  // Somebody who lengthens a list at will sees what would come next.
  test("one that was lengthened further than it was opened is named", () => {
    const check = only(failed((draft) => moveBefore(draft, lengthening(draft), actOf(draft, "cells-assigned")), short));
    expect(check.detail).toContain("entries after: the record says 15; expected 12");
  });
});

describe("what is told beside a check that passes", () => {
  const detailOf = (record: RecordFile, id: string): string =>
    found(replay(record).checks.find((check) => check.id === id)).detail;

  // R7: a draw that was declared after the first count of its season.
  test("limits that were declared after a count are said to be chosen after counts were seen", () => {
    const record = goodRecord();
    expect(detailOf(record, "estimate-1")).not.toContain("chosen after");
    const late = goodRecord((draft) => {
      moveBefore(draft, actOf(draft, "count-entered"), actOf(draft, "draw-declared", 2));
    });
    expect(detailOf(late, "estimate-1")).toContain("chosen after counts were seen");
  });

  test("a seed that an earlier declaration on the frame had is pointed out", () => {
    const again = goodRecord((draft) => {
      const first = found(draft.record.declarations[0]);
      const second = found(draft.record.declarations[1]);
      actOf(draft, "seed-given", 1).payload["seed"] = found(first.seed ?? undefined).text;
      found(second.seed ?? undefined).text = found(first.seed ?? undefined).text;
    });
    expect(detailOf(again, "seed-2")).toContain("The same seed on the same frame as draw 1: the same cells.");
    expect(detailOf(again, "seed-3")).not.toContain("The same seed");
  });

  test("other surveys with the same boundary file are told", () => {
    expect(detailOf(goodRecord(), "told")).toContain(
      "1 other survey with the same boundary file, 0 with the same frame",
    );
  });
});
