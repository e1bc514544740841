import { expect, test } from "vitest";
import { replay } from "#shared/record/replay.ts";
import { goodRecord } from "../../fixtures/record.ts";
import { SOURCE_FILE } from "../../fixtures/record-base.ts";

/** The boundary of the good record with latitude first, as some programs write it. */
const latitudeFirst = {
  name: "latitude-first.geojson",
  bytes: new TextEncoder().encode(
    new TextDecoder().decode(SOURCE_FILE.bytes).replace(/\[(9[.\d]*),(53[.\d]*)\]/g, "[$2,$1]"),
  ),
};

test("a boundary file that was read by an answer is read again by the same answer", () => {
  const record = goodRecord(undefined, { source: { file: latitudeFirst, answers: { axes: "exchanged" } } });
  expect(record.areas[0]?.report["answers"]).toEqual({ axes: "exchanged" });
  const check = replay(record, { sourceFile: latitudeFirst }).checks.find(({ id }) => id === "frame-1-source");
  expect(check?.outcome).toBe("passed");
});

// Latitude 9, longitude 53 is another place, so the edges are thousands of kilometres away.
test("without its answer the file does not fit the frame", () => {
  const record = goodRecord(({ record: { areas } }) => delete areas[0]?.report["answers"], {
    source: { file: latitudeFirst, answers: { axes: "exchanged" } },
  });
  const check = replay(record, { sourceFile: latitudeFirst }).checks.find(({ id }) => id === "frame-1-source");
  expect(check?.outcome).not.toBe("passed");
});
