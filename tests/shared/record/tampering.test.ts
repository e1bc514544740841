import { describe, expect, test, vi } from "vitest";
import type { ReplayGiven } from "#shared/record/checks/check.ts";
import type { RecordFile } from "#shared/record/record-file.ts";
import { replay } from "#shared/record/replay.ts";
import { keyFingerprint } from "#shared/record/sign.ts";
import { goodRecord } from "../../fixtures/record.ts";
import { SOURCE_FILE } from "../../fixtures/record-base.ts";

vi.setConfig({ testTimeout: 30_000 });

const good = goodRecord();
const anotherHash = "0123456789abcdef".repeat(4);

function failing(record: unknown, given: ReplayGiven = {}): string[] {
  return replay(record, given)
    .checks.filter(({ outcome }) => outcome === "failed")
    .map(({ id }) => id);
}

/** A copy of the good record with one thing changed in it. */
function changed(change: (record: RecordFile) => void): RecordFile {
  const copy = JSON.parse(JSON.stringify(good)) as RecordFile;
  change(copy);
  return copy;
}

function at<T>(list: readonly T[] | undefined, place: number): T {
  const item = list?.at(place);
  if (item === undefined) throw new Error(`nothing in place ${place}`);
  return item;
}

const eventOf = (record: RecordFile, kind: string) => {
  const found = record.events.find(({ envelope }) => envelope.kind === kind);
  if (!found) throw new Error(`no event ${kind}`);
  return found;
};

const statementOf = (record: RecordFile) => at(record.frames, 0).statement as { rings: number[][][][]; units: number };

function moveCorner(corner: number[]): void {
  corner[0] = at(corner, 0) + 1;
}

const seedOf = (record: RecordFile, place: number) => found(at(record.declarations, place).seed);
const endingOf = (ending: RecordFile["draws"][number]["withdrawn"]) => found(ending);

function found<T>(item: T | null): T {
  if (item === null) throw new Error("nothing there");
  return item;
}

test("a record that nobody touched passes every check that can be made", () => {
  const hashes = [at(good.events, 3).sha256, at(good.events, -1).sha256];
  const report = replay(good, {
    heldHashes: hashes,
    fingerprint: keyFingerprint(good.publicKey),
    sourceFile: SOURCE_FILE,
  });
  expect(report.checks.filter(({ outcome }) => outcome !== "passed")).toEqual([]);
  expect(report.checks.length).toBeGreaterThan(25);
  expect(report.summary.headline).toBe(`${report.checks.length} of ${report.checks.length} checks pass.`);
});

test("what an auditor does not hold is not checked, and said so", () => {
  const { checks } = replay(good);
  const open = checks.filter(({ outcome }) => outcome === "not-checked");
  expect(open.map(({ id }) => id)).toEqual(["held-hashes", "source-file", "frame-1-source"]);
  expect(at(open, 0).detail).toContain("None given");
  expect(at(open, 2).detail).toBe("Rings taken as given.");
});

/** What is changed, how, and the one check that names it, with words that its detail holds. */
const CHANGES: readonly [string, (record: RecordFile) => void, string, RegExp][] = [
  ["an unknown member", (r) => Object.assign(r, { extra: 1 }), "format", /the file: unknown member "extra"/],
  ["a draw of no frame", (r) => (at(r.draws, 1).frameId = "elsewhere"), "format", /draws\[1\]\.frameId/],
  ["an event's time", (r) => (at(r.events, 5).envelope.at = "2031-01-01T00:00:00.000Z"), "chain", /event 6, hash/],
  ["an event's own hash", (r) => (at(r.events, 5).sha256 = anotherHash), "chain", /event 6, hash of its envelope/],
  ["an event's actor", (r) => (at(r.events, 5).envelope.member = "x"), "chain", /event 6/],
  ["the order of two events", (r) => r.events.splice(1, 2, at(r.events, 2), at(r.events, 1)), "chain", /place 2/],
  ["a payload", (r) => (eventOf(r, "count-entered").payload["value"] = 9), "payloads", /event \d+, count-entered/],
  ["a salt", (r) => (at(r.events, 4).salt = "0".repeat(32)), "payloads", /event 5, area-imported/],
  ["a signature", (r) => (at(r.events, 7).signature = "ab".repeat(64)), "signatures", /event 8/],
  ["the public key", (r) => (r.publicKey = anotherHash), "signatures", /event 1/],
  ["the survey's name", (r) => (r.survey.name = "Other Field"), "survey", /survey, name.*"Other Field".*"Tolve Field"/],
  ["the counting rule", (r) => (at(r.survey.targets, 0).countingRule = "some"), "survey", /countingRule/],
  ["somebody's name", (r) => (at(r.people, 1).name = "Nobody"), "survey", /"Nobody"; expected "Lars Lead"/],
  ["somebody's role", (r) => at(r.people, 2).roles.push("planner"), "survey", /Anne Auditor, roles/],
  ["the file's hash", (r) => (at(r.areas, 0).fileSha256 = anotherHash), "areas", /area 1, hash of the file/],
  ["a vertex", (r) => moveCorner(at(at(at(statementOf(r).rings, 0), 0), 0)), "frame-1-sealed", /frame 1, hash/],
  ["N", (r) => (statementOf(r).units += 1), "frame-1-sealed", /hash of its statement/],
  [
    "when a frame was sealed",
    (r) => (at(r.frames, 0).sealedAt = at(r.events, 0).envelope.at),
    "frame-1-sealed",
    /sealed at/,
  ],
  [
    "a declared n",
    (r) => (at(r.declarations, 2).declaration["reserves"] = 5),
    "declarations",
    /draw 2, hash of the decl/,
  ],
  [
    "a declaration's hash",
    (r) => (at(r.declarations, 0).sha256 = anotherHash),
    "declarations",
    /draw 1, hash of the decl/,
  ],
  ["a seed", (r) => (seedOf(r, 2).text = "1"), "seed-3", /draw 2, seed: .*"1"; expected "205739/],
  ["a seed's source", (r) => (seedOf(r, 0).source = "dice"), "seed-1", /"dice"; expected "typed"/],
  ["a picked unit", (r) => (at(at(at(r.draws, 1).lists, 0).entries, 4).unit = 33), "draw-2", /draw 2, entry 5, unit/],
  [
    "a label",
    (r) => (at(at(at(r.draws, 0).lists, 0).entries, 0).label = "Z9"),
    "draw-1",
    /draw 1, entry 1, label.*"Z9"/,
  ],
  ["the last entry", (r) => at(at(r.draws, 1).lists, 0).entries.pop(), "draw-2", /entry 16/],
  [
    "the reason of a withdrawal",
    (r) => (endingOf(at(r.draws, 0).withdrawn).reason = "rain"),
    "told",
    /"rain"; expected "n typed/,
  ],
  ["a withdrawal", (r) => (at(r.draws, 0).withdrawn = null), "told", /draw 1, withdrawn, reason/],
  [
    "an abandonment",
    (r) => (endingOf(at(r.declarations, 1).abandoned).at = r.exportedAt),
    "told",
    /declaration 2, abandoned, at/,
  ],
  ["when a season used a draw", (r) => (at(r.seasonDraws, 0).endedAt = null), "told", /draw 1, in use until/],
  ["a closing", (r) => r.pickActs.pop(), "reserves", /draw 2, act 1/],
  ["why a cell was closed", (r) => (at(r.pickActs, 0).reason = "fog"), "reserves", /"fog"; expected "the tide was in"/],
  ["where a cell is", (r) => (at(r.visits, 2).column += 1), "visits", /cell \w+ \(unit \d+\), column/],
  ["when a cell was opened", (r) => (at(r.visits, -1).openedAt = r.exportedAt), "visits", /opened at/],
  [
    "who went where",
    (r) => (at(r.assignments, 0).member = "member-planner"),
    "assignments",
    /"Paula Planner"; expected "L/,
  ],
  [
    "why a count was amended",
    (r) => (at(r.counts, -1).reason = "again"),
    "counts",
    /reason.*"again".*as event 30 says/,
  ],
  ["who counted", (r) => (at(r.counts, 3).observer = "member-auditor"), "counts", /counted by/],
  ["an amendment", (r) => r.counts.pop(), "counts", /no such count; expected 5, as event 30 says/],
  ["an estimate", (r) => Object.assign(at(r.estimates, 0).result, { seen: 1 }), "estimate-1", /hash of its result/],
];

describe("one change in a record is named by one check", () => {
  test.each(CHANGES)("%s", (_what, change, id, words) => {
    const report = replay(changed(change));
    const failed = report.checks.filter(({ outcome }) => outcome === "failed");
    expect(failed.map((check) => check.id)).toEqual([id]);
    expect(at(failed, 0).detail).toMatch(words);
    expect(report.summary.failed).toBe(1);
  });
});

test("a changed count is named by cell, with the value found and the value of its event", () => {
  const place = good.counts.findIndex(({ value }) => value === 5);
  const { visitId, value } = at(good.counts, place);
  const unit = Number(visitId.replace("visit-", ""));
  const { label } = at(at(good.draws, 1).lists, 0).entries.find((entry) => entry.unit === unit) ?? { label: "?" };
  const sequence = good.events.findIndex(({ payload }) => payload["entryId"] === at(good.counts, place).id) + 1;

  const report = replay(changed((record) => (at(record.counts, place).value = 55)));

  const check = report.checks.find(({ id }) => id === "counts");
  expect(check?.detail).toBe(
    `cell ${label} (unit ${unit}): the record says 55; expected ${value ?? ""}, as event ${sequence} says.`,
  );
  expect(check?.difference).toEqual({
    where: `cell ${label} (unit ${unit})`,
    found: "55",
    expected: `${value ?? ""}, as event ${sequence} says`,
  });
});

test("a record that was cut off before its last event fails against a hash that was held", () => {
  const cut = changed((record) => {
    record.events.pop();
    record.estimates.pop();
  });
  expect(failing(cut)).toEqual([]);
  expect(failing(cut, { heldHashes: [at(good.events, -1).sha256] })).toEqual(["held-hashes"]);
});

test("a draw that is left out is missed by the events, and its cells have no draw", () => {
  const left = changed((record) => {
    record.draws.shift();
    record.seasonDraws.shift();
  });
  expect(failing(left)).toEqual(["told", "visits"]);
});

test("a fingerprint, a held hash or a boundary file that is another one is named", () => {
  expect(failing(good, { fingerprint: anotherHash })).toEqual(["signatures"]);
  expect(failing(good, { heldHashes: [anotherHash] })).toEqual(["held-hashes"]);
  expect(failing(good, { heldHashes: ["abc"] })).toEqual(["held-hashes"]);
  const bytes = new TextEncoder().encode(`${new TextDecoder().decode(SOURCE_FILE.bytes)} `);
  expect(failing(good, { sourceFile: { name: "other.geojson", bytes } })).toEqual(["source-file"]);
});

test("a held hash may be typed with spaces and in capitals", () => {
  const { sha256 } = at(good.events, 8);
  const typed = (sha256.toUpperCase().match(/.{4}/g) ?? []).join(" ");
  const check = replay(good, { heldHashes: [typed] }).checks.find(({ id }) => id === "held-hashes");
  expect(check?.outcome).toBe("passed");
  expect(check?.detail).toContain("is event 9");
});

test("what throws in the progress ends the replay", () => {
  expect(() =>
    replay(good, {}, (done) => {
      if (done > 6) throw new Error("cancelled by the reader");
    }),
  ).toThrow("cancelled by the reader");
});

test("the progress ends where it said that it would", () => {
  const told: [number, number][] = [];
  replay(good, {}, (done, of) => told.push([done, of]));
  const [done, of] = at(told, -1);
  expect(done).toBe(of);
  expect(told.every(([before], place) => place === 0 || before >= at(told, place - 1)[0])).toBe(true);
});
