import { join } from "node:path";
import { afterAll, describe, expect, test, vi } from "vitest";
import { cliFolder, json, quillet, refusal } from "../fixtures/cli.ts";
import { goodRecord } from "../fixtures/record.ts";
import { SOURCE_FILE } from "../fixtures/record-base.ts";

vi.setConfig({ testTimeout: 60_000 });

const { path: folder, file, remove } = cliFolder();
afterAll(remove);

describe("estimate", () => {
  // Mean 3.6, s² = 6.7111, SE = √(s²/10) of ten picks of seven cells; total 60 × 3.6. By hand, and R's survey package
  // (reference set "srswr-duplicates"): t limits of the mean at 0.95 are 1.7468 … 5.4532.
  test("repeats enter as often as they were picked", async () => {
    const rows = ["B7,5", "C2,2", "B7,5", "A1,0", "F9,9", "C2,2", "B7,5", "D4,1", "E5,4", "A3,3"];
    const counts = file("counts.csv", `pick,unit,count\n${rows.map((row, i) => `${i + 1},${row}\n`).join("")}`);
    const args = ["estimate", "--counts", counts, "--design", "srs-wr", "--units", "60", "--area", "150000"];
    const result = json(await quillet(args));
    expect(result).toMatchObject({ n: 10, distinct: 7, degreesOfFreedom: 9 });
    expect(result["mean"]).toBeCloseTo(3.6, 12);
    expect(result["variance"]).toBeCloseTo(6.711111111111111, 12);
    expect(result["standardErrorOfMean"]).toBeCloseTo(0.8192137151629671, 12);
    expect(result["total"]).toBeCloseTo(216, 9);
    expect(result["density"]).toBeCloseTo(216 / 15, 12);
    const limits = result["limits"] as { t: { lower: number; upper: number } };
    expect(limits.t.lower / 60).toBeCloseTo(1.7468, 3);
    expect(limits.t.upper / 60).toBeCloseTo(5.4532, 3);
  });

  test("an empty count is uncounted, never zero", async () => {
    const counts = file("gaps.csv", "pick,count,state\n1,4,\n2,,unsafe\n3,,\n4,6,\n");
    const result = json(await quillet(["estimate", "--counts", counts, "--design", "srs-wor", "--units", "20"]));
    expect(result).toMatchObject({ n: 2, distinct: null, mean: 5, density: null });
  });

  test("what cannot be a count is named by its line", async () => {
    const counts = file("bad.csv", "pick,unit,count\n1,A1,3\n2,A2,about 5\n");
    const start = ["estimate", "--counts", counts, "--units", "20", "--design"];
    expect(refusal(await quillet([...start, "srs-wr"]), 1)).toContain("Line 3");
    expect(refusal(await quillet([...start, "pps-wr"]), 2)).toContain("--design pps-wr: not in this version.");
    expect(refusal(await quillet([...start, "srs-wr", "--estimator", "ratio"]), 2)).toContain("not in this version");
  });

  // Counts 1 … 6: mean 3.5, s² = 17.5/5, SE = √(3.5/6) with no correction, total 4 × 3.5.
  test("with replacement there may be more picks than cells, also where the table names none", async () => {
    const counts = file("many.csv", "pick,count\n1,1\n2,2\n3,3\n4,4\n5,5\n6,6\n");
    const start = ["estimate", "--counts", counts, "--units", "4", "--design"];
    const result = json(await quillet([...start, "srs-wr"]));
    expect(result).toMatchObject({ n: 6, distinct: null, mean: 3.5, variance: 3.5, total: 14 });
    expect(result["standardErrorOfMean"]).toBeCloseTo(0.7637626158259734, 12);
    expect(refusal(await quillet([...start, "srs-wor"]), 1)).toContain("6 cells, and the frame has 4");
  });

  test("a table that names more cells than the frame has is refused with both numbers", async () => {
    const counts = file("over.csv", "pick,unit,count\n1,A1,1\n2,A2,2\n3,A3,\n");
    const ran = await quillet(["estimate", "--counts", counts, "--design", "srs-wr", "--units", "2"]);
    expect(refusal(ran, 1)).toContain("The table names 3 cells, and --units says that the frame has 2.");
  });

  // N·(−ln α)/m with m = 3 distinct cells of four picks: 300 × 2.995732/3 one-sided, 300 × (−ln 0.025 = 3.688879)/3 two-sided.
  test("where every count is zero the upper limits under the Poisson model stand, each named", async () => {
    const counts = file("zeros.csv", "pick,unit,count\n1,A1,0\n2,B2,0\n3,A1,0\n4,C3,0\n");
    const ran = await quillet(["estimate", "--counts", counts, "--design", "srs-wr", "--units", "300"]);
    const limits = json(ran)["limits"] as Record<string, { lower: number; upper: number } | null>;
    expect(limits).toMatchObject({ t: null, lognormal: null });
    expect(limits["poissonOneSided"]?.lower).toBe(0);
    expect(limits["poissonOneSided"]?.upper).toBeCloseTo(299.5732273553991, 9);
    expect(limits["poissonTwoSided"]?.upper).toBeCloseTo(368.8879454113936, 9);
    expect(ran.stderr).toBe("");
  });

  // Four picks are taken to be four cells: 300 × 2.995732/4.
  test("zeros of cells that the table doesn't name: the limits say what they take for granted", async () => {
    const counts = file("zeros-unnamed.csv", "pick,count\n1,0\n2,0\n3,0\n4,0\n");
    const start = ["estimate", "--counts", counts, "--design", "srs-wr", "--units"];
    const ran = await quillet([...start, "300"]);
    const limits = json(ran)["limits"] as Record<string, { upper: number }>;
    expect(limits["poissonOneSided"]?.upper).toBeCloseTo(224.6799205165493, 9);
    expect(ran.stderr).toContain("each pick is taken to be a cell of its own");
    const few = await quillet([...start, "3"]);
    expect(json(few)["limits"]).toEqual({ t: null, lognormal: null });
    expect(few.stderr).toContain("nobody can say whether every cell was seen");
  });

  test("no upper limit is made up where something was found or all was counted", async () => {
    const found = file("found.csv", "pick,count\n1,0\n2,1\n");
    const whole = file("whole.csv", "pick,count\n1,0\n2,0\n");
    const start = ["estimate", "--design", "srs-wor", "--units"];
    expect(Object.keys(json(await quillet([...start, "9", "--counts", found]))["limits"] as object)).toEqual([
      "t",
      "lognormal",
    ]);
    expect(json(await quillet([...start, "2", "--counts", whole]))["limits"]).toEqual({
      t: { lower: 0, upper: 0 },
      lognormal: { lower: 0, upper: 0 },
    });
  });

  test("a pick that stands twice is named by its line", async () => {
    const counts = file("twice.csv", "pick,unit,count\n1,A1,3\n1,A2,4\n");
    const ran = await quillet(["estimate", "--counts", counts, "--design", "srs-wr", "--units", "20"]);
    expect(refusal(ran, 1)).toContain("Line 3: pick 1 stands in an earlier line too.");
  });

  test("two counts of one cell are refused", async () => {
    const counts = file("two.csv", "pick,unit,count\n1,A1,3\n2,A1,4\n");
    const ran = await quillet(["estimate", "--counts", counts, "--design", "srs-wr", "--units", "20"]);
    expect(refusal(ran, 1)).toContain("the cell A1 has another count");
  });
});

describe("replay", () => {
  test("a good record passes: one line a check, status 0", async () => {
    const path = file("record.json", JSON.stringify(goodRecord()));
    const ran = await quillet(["replay", path]);
    expect(ran.status).toBe(0);
    const lines = ran.stdout.split("\n");
    expect(lines.filter((line) => line.startsWith("passed"))).toHaveLength(25);
    expect(lines.filter((line) => line.startsWith("not checked"))).toHaveLength(3);
    expect(ran.stdout).toContain("The seed was chosen by Paula Planner; nothing shows that only one was tried.");
  });

  test("a changed count fails with status 1, and the line names cell, value found and value of the event", async () => {
    const record = goodRecord();
    const [first] = record.counts.filter(({ value }) => value === 5);
    if (first) first.value = 50;
    const ran = await quillet(["replay", file("tampered.json", JSON.stringify(record))]);
    expect(ran.status).toBe(1);
    expect(ran.stdout).toMatch(
      /^FAILED {7}.*cell \w+ \(unit \d+\): the record says 50; expected 5, as event \d+ says/m,
    );
  });

  test("a boundary file, a hash and a fingerprint make it stronger", async () => {
    const path = file("record.json", JSON.stringify(goodRecord()));
    const area = file(SOURCE_FILE.name, new TextDecoder().decode(SOURCE_FILE.bytes));
    const ran = await quillet(["replay", path, "--area", area, "--hash", "ab".repeat(32)]);
    expect(ran.stdout).toContain("9 vertices in whole millimetres, all equal");
    expect(ran.stdout).toMatch(/^FAILED.*not in this chain/m);
  });

  test("what is no record is refused", async () => {
    expect(refusal(await quillet(["replay", file("no.json", "{")]), 1)).toContain("record-invalid");
    expect(refusal(await quillet(["replay", join(folder, "nowhere.json")]), 1)).toContain("There is no file");
    const other = await quillet(["replay", file("other.json", "{}")]);
    expect(other.status).toBe(1);
    expect(other.stdout).toContain("FAILED");
  });
});
