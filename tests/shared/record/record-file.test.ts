import fc from "fast-check";
import { describe, expect, test, vi } from "vitest";
import { parseRecordFile, type RecordFile } from "#shared/record/record-file.ts";
import { replay } from "#shared/record/replay.ts";
import { goodRecord } from "../../fixtures/record.ts";

vi.setConfig({ testTimeout: 120_000 });

const good = goodRecord();

describe("reading", () => {
  test("a record comes back as it was written", () => {
    expect(parseRecordFile(JSON.stringify(good))).toEqual(good);
  });

  test("a byte order mark in front is passed over", () => {
    expect(parseRecordFile(`\uFEFF${JSON.stringify(good)}`)).toEqual(good);
  });

  const broken: readonly [string, unknown, string][] = [
    ["no JSON", "{", "The file is not JSON"],
    ["another format", { format: "quillet-frame/1" }, 'format: expected "quillet-record/1", found "quillet-frame/1"'],
    ["a list", [], 'format: expected "quillet-record/1", found nothing'],
    ["no events", { ...good, events: undefined }, "events: expected array, found nothing"],
    ["an unknown member", { ...good, note: "" }, 'the file: unknown member "note"'],
    [
      "a unit that is no number",
      { ...good, visits: [{ ...good.visits[0], unit: "4" }] },
      'visits[0].unit: expected number, found "4"',
    ],
    ["a unit 0", { ...good, visits: [{ ...good.visits[0], unit: 0 }] }, "visits[0].unit: expected at least 1, found 0"],
    [
      "a negative count",
      { ...good, counts: [{ ...good.counts[0], value: -1 }] },
      "counts[0].value: expected at least 0, found -1",
    ],
    [
      "a local time",
      { ...good, exportedAt: "2031-06-01 12:00" },
      'exportedAt: expected a time in UTC, found "2031-06-01 12:00"',
    ],
    ["a hash in capitals", { ...good, publicKey: "AB".repeat(32) }, "is not a SHA-256 in lower-case hexadecimal"],
    [
      "a state of no name",
      { ...good, counts: [{ ...good.counts[0], state: "gone" }] },
      'counts[0].state: expected "counted" or',
    ],
  ];

  test.each(broken)("%s is refused by its place", (_name, value, words) => {
    const text = typeof value === "string" ? value : JSON.stringify(value);
    expect(() => parseRecordFile(text)).toThrow(words);
  });
});

test("something that is no record fails the first check and nothing else is said of it", () => {
  const report = replay({ format: "another" });
  expect(report.checks.map(({ id, outcome }) => [id, outcome])).toEqual([["format", "failed"]]);
  expect(report.summary.headline).toBe("This is not a record file.");
});

/** Places that nothing hashes, or that say nothing of what was done: a change there cannot be seen. */
const FREE = [
  /^exportedAt$/,
  /^software\./,
  /^areas\.\d+\.report\.(?!vertices$|geodesicAreaM2$|sha256$|fileName$)/,
  /^seasonDraws\.\d+\.id$/,
  /^visits\.\d+\.id$/,
  /^survey\.seasons\.\d+\.(startsOn|endsOn)$/,
];

interface Leaf {
  readonly path: readonly (string | number)[];
  readonly value: unknown;
}

function leavesOf(value: unknown, path: readonly (string | number)[] = []): Leaf[] {
  if (Array.isArray(value)) return value.flatMap((item: unknown, at) => leavesOf(item, [...path, at]));
  if (typeof value === "object" && value !== null) {
    return Object.entries(value).flatMap(([name, item]) => leavesOf(item, [...path, name]));
  }
  return [{ path, value }];
}

function changedAt(record: RecordFile, { path, value }: Leaf): unknown {
  const copy = JSON.parse(JSON.stringify(record)) as unknown;
  let inner = copy as Record<string | number, unknown>;
  for (const part of path.slice(0, -1)) inner = inner[part] as Record<string | number, unknown>;
  inner[path.at(-1) ?? ""] = other(value);
  return copy;
}

/** Another value of the same type. */
function other(value: unknown): unknown {
  if (typeof value === "number") return value + 1;
  if (typeof value === "boolean") return !value;
  if (value === null) return "2031-06-01T12:00:00.000Z";
  if (typeof value !== "string") throw new RangeError("a leaf is a plain value");
  const text = value;
  if (/^[0-9a-f]{32,}$/.test(text)) return text.replace(/^./, (first) => (first === "0" ? "1" : "0"));
  if (/^\d{4}-\d\d-\d\dT/.test(text)) return text.replace(/^\d{4}/, "2030");
  return `${text}x`;
}

// Every leaf of the record is one of those that are protected by a hash, an event or a repeated computation, or is in FREE.
test("no single value of a record can be changed unseen, but for the few that nothing rests on", () => {
  const leaves = leavesOf(good).filter(({ path }) => !FREE.some((free) => free.test(path.join("."))));
  expect(leaves.length).toBeGreaterThan(700);
  fc.assert(
    fc.property(fc.constantFrom(...leaves), (leaf) => {
      const { checks } = replay(changedAt(good, leaf));
      return checks.some(({ outcome }) => outcome === "failed");
    }),
    { numRuns: 60 },
  );
});
