import { expect, test } from "vitest";
import { EVENT_PAYLOADS } from "#shared/record/events.ts";

const shape = EVENT_PAYLOADS["counts-imported"];
const old = { version: 1, importId: "i1", fileName: "a.csv", fileSha256: "ab".repeat(32), written: 3 };

// Records live for ever: what the first version wrote is read as it was.
test("an imported table of the first version is still read, and one of the second tells order and merged names", () => {
  expect(shape.parse(old)).toEqual(old);
  const told = {
    dateOrder: "day-first",
    merged: [
      { written: "ada ", member: "m1" },
      { written: "r. h", name: "R. H" },
    ],
  };
  const now = { ...old, version: 2, ...told };
  expect(shape.parse(now)).toEqual(now);
  expect(shape.safeParse({ ...old, version: 2 }).success).toBe(false);
  expect(shape.safeParse({ ...old, version: 3, ...told }).success).toBe(false);
});
