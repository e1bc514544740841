import { spawnSync } from "node:child_process";
import { existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, afterEach, describe, expect, test, vi } from "vitest";
import { cliFolder, json, quillet, refusal } from "../fixtures/cli.ts";
import { SOURCE_FILE } from "../fixtures/record-base.ts";

vi.setConfig({ testTimeout: 240_000 });

const root = fileURLToPath(new URL("../../", import.meta.url));
const geometry = join(root, "tests/reference/geometry");
const { path: folder, file, remove } = cliFolder();

afterEach(() => {
  vi.unstubAllEnvs();
});
afterAll(remove);

interface Case {
  readonly id: string;
  readonly rings_file: string;
  readonly cell_width_mm: number;
  readonly cell_height_mm: number;
  readonly origin_mm: readonly [number, number];
  readonly area_m2: number;
  readonly rules: Readonly<Record<string, { readonly N: number; readonly sha256_with_empty_stratum: string }>>;
}

describe("grid", () => {
  // tests/reference/geometry: two independent exact computations in rational numbers, Python 3.11.
  const { cases } = JSON.parse(readFileSync(join(geometry, "expected.json"), "utf8")) as { cases: Case[] };
  const edges: readonly [string, number, string, string][] = [
    ["syn_island_in_hole", 10_000, "touch", "clip"],
    ["syn_hole_touches_outer_at_vertex", 8000, "centre", "centre"],
    ["syn_hole_touches_outer_at_vertex", 10_000, "share:0.75", "share:0.75:inside"],
    ["syn_thin_diagonal", 10_000, "touch", "share:0.000000001:whole"],
    ["syn_spike_like", 10_000, "inside", "inside"],
  ];

  test.each(edges)("%s in cells of %i mm by the rule %s gives the listed cells", async (id, width, rule, edge) => {
    const wanted = cases.find((one) => one.id === id && one.cell_width_mm === width);
    if (!wanted) throw new Error(`no case ${id}`);
    const ran = await quillet([
      ...["grid", "--rings", join(geometry, wanted.rings_file), "--edge", edge],
      ...["--cell", String(wanted.cell_width_mm / 1000), "--height", String(wanted.cell_height_mm / 1000)],
      ...["--origin", wanted.origin_mm.map((mm) => mm / 1000).join(",")],
    ]);
    const result = JSON.parse(ran.stdout) as Record<string, unknown>;
    expect(result["cells"]).toBe(wanted.rules[rule]?.N);
    expect(result["listSha256"]).toBe(wanted.rules[rule]?.sha256_with_empty_stratum);
    expect(result["areaM2"]).toBeCloseTo(wanted.area_m2, 9);
  });

  // 30 × 30 m in cells of 10 m: nine whole cells; two are left out, so seven and 200 m² that no cell holds.
  test("cells left out are neither in the list nor in N, and their ground is uncovered", async () => {
    const leftOut = file("left.csv", 'label,reason\nA1,bog\nC3,"owner says no"\n');
    const rings = join(geometry, "syn_aligned_square.rings_mm.json");
    const list = join(folder, "list.txt");
    const out = join(folder, "frame.json");
    const args = ["grid", "--rings", rings, "--cell", "10", "--leave-out", leftOut, "--list", list, "--out", out];
    const result = json(await quillet(args));
    expect(result).toMatchObject({ cells: 7, frameAreaM2: 700, areaM2: 900, uncoveredM2: 200 });
    expect(readFileSync(list, "utf8")).toBe(
      ["1,2", "2,2", "0,1", "1,1", "2,1", "0,0", "1,0"].map((cell) => `${cell},1000000000,\n`).join(""),
    );
    const statement = JSON.parse(readFileSync(out, "utf8")) as Record<string, unknown>;
    expect(statement["leftOut"]).toEqual([
      { column: 0, row: 2, reason: "bog" },
      { column: 2, row: 0, reason: "owner says no" },
    ]);
    expect(statement["listSha256"]).toBe(result["listSha256"]);
  });

  test("a boundary file in degrees becomes a frame on the plane that was asked for", async () => {
    const area = file(SOURCE_FILE.name, new TextDecoder().decode(SOURCE_FILE.bytes));
    const result = json(await quillet(["grid", "--area", area, "--crs", "EPSG:32632", "--cell", "20"]));
    expect(result).toMatchObject({ crs: "EPSG:32632", cells: 33, uncoveredM2: 0 });
    expect(result["frameAreaM2"]).toBeCloseTo(result["areaM2"] as number, 3);
  });

  test.each([
    [["--shape", "hexagon"], "--shape hexagon: not in this version."],
    [["--rotate", "10"], "--rotate other than 0: not in this version."],
    [["--zones", "z.json"], "--zones: not in this version."],
    [["--edge", "touch"], "--edge is clip, centre, inside, share:P:inside or share:P:whole"],
    [["--edge", "share:1.5:whole"], "above 0 and at most 1"],
    [["--origin", "5"], "--origin is east and north in metres"],
    [["--colour", "red"], "Unknown option '--colour'"],
  ])("%s is wrong usage", async (args, words) => {
    const rings = join(geometry, "syn_aligned_square.rings_mm.json");
    expect(refusal(await quillet(["grid", "--rings", rings, "--cell", "10", ...args]), 2)).toContain(words);
  });

  test.each([
    [["--cell", "0.001"], "cell-size"],
    [["--cell", "100", "--edge", "inside"], "frame-empty"],
  ])("%s is refused", async (args, code) => {
    const rings = join(geometry, "syn_aligned_square.rings_mm.json");
    expect(refusal(await quillet(["grid", "--rings", rings, ...args]), 1)).toContain(code);
  });
});

describe("draw", () => {
  test("a draw from a frame statement repeats, picks first, then reserves", async () => {
    const rings = join(geometry, "syn_island_in_hole.rings_mm.json");
    const out = join(folder, "island.json");
    const made = json(await quillet(["grid", "--rings", rings, "--cell", "10", "--out", out]));
    const args = ["draw", "--frame", out, "--design", "srs-wr", "--n", "10", "--seed", "0042", "--reserves", "3"];
    const first = json(await quillet(args));
    expect(json(await quillet(args))).toEqual(first);
    expect(first["frameSha256"]).toBe(made["frameSha256"]);
    const picks = first["picks"] as { order: number; unit: number; reserve: boolean; repeatOf: number | null }[];
    expect(picks.map(({ order }) => order)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13]);
    expect(picks.filter(({ reserve }) => reserve).map(({ order }) => order)).toEqual([11, 12, 13]);
    expect(first["distinct"]).toBe(new Set(picks.slice(0, 10).map(({ unit }) => unit)).size);
  });

  test("designs of later versions and a seed with a tab are refused", async () => {
    const out = join(folder, "island.json");
    const start = ["draw", "--frame", out, "--n", "3", "--design"];
    expect(refusal(await quillet([...start, "balanced", "--seed", "1"]), 2)).toContain("not in this version");
    expect(refusal(await quillet([...start, "srs-wor", "--seed", "1\t2"]), 1)).toContain("a tab (U+0009)");
  });
});

describe("create-owner", () => {
  test("an owner is made in the data folder, with a password where none is given", async () => {
    vi.stubEnv("QUILLET_DATA", join(folder, "data"));
    const args = ["create-owner", "--email", "Ola@Example.org", "--name", "Ola"];
    const made = json(await quillet(args));
    expect(made).toMatchObject({ email: "ola@example.org", name: "Ola" });
    expect(String(made["password"]).length).toBeGreaterThanOrEqual(12);
    expect(refusal(await quillet(args), 1)).toContain("account-exists");
  });

  test.each([{}, { QUILLET_DEMO: "1", QUILLET_DATA: join(folder, "demo") }])(
    "in the demo (%o) no owner is made, and the line says what to set",
    async (variables) => {
      vi.stubEnv("QUILLET_DATA", "");
      vi.stubEnv("QUILLET_DEMO", "");
      for (const [name, value] of Object.entries(variables)) vi.stubEnv(name, value);
      const args = ["create-owner", "--email", "ola@example.org"];
      expect(refusal(await quillet(args), 1)).toContain("Set QUILLET_DATA");
      expect(existsSync(join(folder, "demo"))).toBe(false);
    },
  );

  test("a short password is refused", async () => {
    const args = ["create-owner", "--email", "b@example.org", "--password", "short"];
    vi.stubEnv("QUILLET_DATA", join(folder, "data"));
    expect(refusal(await quillet(args), 1)).toContain("password-too-short");
  });
});

test("no command, an unknown one and one of a later version are wrong usage; help is not", async () => {
  expect(refusal(await quillet([]), 2)).toContain("No command");
  expect(refusal(await quillet(["fly"]), 2)).toContain('There is no command "fly"');
  const help = await quillet(["--help"]);
  expect(help.status).toBe(0);
  expect(help.stdout).toContain("replay RECORD.json");
});

test("the demo is refused in real mode", async () => {
  vi.stubEnv("QUILLET_DATA", join(folder, "real"));
  expect(refusal(await quillet(["demo"]), 2)).toContain("never filled");
});

test("from a terminal a result is JSON on stdout, whatever set-up has to say", () => {
  const counts = file("spawned.csv", "pick,count\n1,4\n2,6\n");
  const args = ["server/bin/quillet.mjs", "estimate", "--counts", counts, "--design", "srs-wor", "--units", "20"];
  const ran = spawnSync(process.execPath, args, { encoding: "utf8", cwd: root });
  expect(ran.status).toBe(0);
  expect(JSON.parse(ran.stdout)).toMatchObject({ n: 2, mean: 5, total: 100 });
  const wrong = spawnSync(process.execPath, ["server/bin/quillet.mjs", "fly"], { encoding: "utf8", cwd: root });
  expect(wrong.status).toBe(2);
  expect(wrong.stdout).toBe("");
});
