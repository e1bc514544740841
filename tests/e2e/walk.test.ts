import { execFileSync } from "node:child_process";
import { mkdtempSync, readFileSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, inject, test } from "vitest";
import { launch, person } from "./browser.ts";
import { accept } from "./invited.ts";

// The whole path, once, as the people who walk it: an owner starts the survey and brings the four roles in; the planner imports
// a boundary, seals a frame and draws; the lead shares cells out, takes waypoints, closes a pick and reads a table of counts in;
// the counter counts; the auditor replays the record, and finds the one count that somebody changed in a copy of it.
// Each test goes on from where the one before left off.

const base = inject("base");
const PASSWORD = "the first sentence of theirs";
const folder = mkdtempSync(join(tmpdir(), "quillet-walk-"));
const roles = ["planner", "lead", "counter", "auditor"] as const;

let browser: Browser;
const pages = new Map<string, Page>();
const errors: string[] = [];
let survey = "";
let recordFile = "";

beforeAll(async () => {
  browser = await launch();
});

afterAll(async () => {
  await browser.close();
});

async function signIn(email: string, password: string, width = 1280): Promise<Page> {
  const { page, errors: own } = await person(browser, width);
  page.on("close", () => errors.push(...own));
  await page.goto(`${base}/sign-in`);
  await page.getByLabel("E-mail").fill(email);
  await page.getByLabel("Password", { exact: true }).fill(password);
  await page.getByRole("button", { name: "Sign in" }).click();
  await page.waitForURL(/\/surveys/);
  expect(own).toEqual([]);
  return page;
}

async function as(role: (typeof roles)[number], width?: number): Promise<Page> {
  const known = pages.get(role);
  if (known) return known;
  const page = await signIn(`${role}@example.org`, PASSWORD, width);
  pages.set(role, page);
  return page;
}

async function stage(page: Page, name: string): Promise<void> {
  await page.goto(`${base}${survey}/${name}`);
  await page.getByRole("heading", { level: 1 }).waitFor();
}

async function saved(page: Page, press: () => Promise<void>, name: string): Promise<string> {
  const [download] = await Promise.all([page.waitForEvent("download"), press()]);
  const path = join(folder, name);
  await download.saveAs(path);
  return path;
}

describe("from a boundary file to a defended estimate", () => {
  test("the owner starts a survey and brings in the four roles", async () => {
    const page = await signIn(inject("ownerEmail"), inject("ownerPassword"));
    await page.goto(`${base}/surveys/new`);
    await page.getByLabel("Name of the survey").fill("Ludden Fold");
    await page.getByLabel("One of what is counted").fill("burrow");
    await page.getByLabel("Several of them").fill("burrows");
    await page.getByLabel("Season").fill("2031");
    await page.getByRole("button", { name: /start/i }).click();
    await page.waitForURL(/\/surveys\/(?!new)[^/]+/);
    survey = new URL(page.url()).pathname.replace(/^(\/surveys\/[^/]+).*$/, "$1");

    await page.goto(`${base}${survey}/people`);
    for (const role of roles) {
      await page.getByLabel("E-mail").fill(`${role}@example.org`);
      await page.getByRole("radio", { name: new RegExp(`^(a |an )?(field )?${role}`, "i") }).check();
      await page.getByRole("button", { name: "Add to the survey" }).click();
      await page.getByRole("row", { name: new RegExp(`^${role}@example.org ${role}`) }).waitFor();
      await expect.poll(() => page.getByLabel("E-mail").inputValue(), { timeout: 20_000 }).toBe("");
    }
    await page.close();
    for (const role of roles) {
      const { page: own, errors: logged } = await person(browser);
      await accept(own, `${role}@example.org`, { name: `${role} of the walk`, password: PASSWORD });
      expect(logged).toEqual([]);
      await own.close();
    }
  });

  test("a file without a known system is asked about, and the planner's boundary is read", async () => {
    const page = await as("planner");
    await stage(page, "area");
    const picker = page.locator("input[type=file]").first();
    await picker.setInputFiles("tests/reference/imports/wheat.zip");
    await page
      .getByText(/^Which (degrees|grid|coordinate)/)
      .first()
      .waitFor();
    await page
      .locator("input[type=file]")
      .first()
      .setInputFiles("tests/reference/imports/made/good_polygon_hole.geojson");
    await page.getByText("good_polygon_hole.geojson").first().waitFor();
    await page.getByRole("figure").first().waitFor();
  });

  test("the planner lays squares of 50 m over it and seals them", async () => {
    const page = await as("planner");
    await stage(page, "frame");
    await page.getByLabel("Square, side").fill("50");
    const seal = page.getByRole("button", { name: /^Seal the frame: \d/ });
    await seal.waitFor();
    await page.waitForTimeout(1500); // the preview of the new size, then the draft
    const cells = Number(/([\d\u202f]+) cells/.exec((await seal.textContent()) ?? "")?.[1]?.replace("\u202f", ""));
    expect(cells).toBeGreaterThan(200);
    await seal.click();
    await page.getByText("version 1, sealed").first().waitFor();
  });

  test("the planner declares, draws twelve cells from a typed seed, and the cells are those of the recipe", async () => {
    const page = await as("planner");
    await stage(page, "draw");
    await page.getByLabel("Picks, n").fill("12");
    await page.getByRole("radio", { name: /^Typed/ }).check();
    await page.getByRole("button", { name: "Declare the draw" }).click();
    await page.getByLabel("Seed", { exact: true }).fill("00391522864013975605");
    await page.getByRole("button", { name: "Draw with this seed" }).click();
    await page.getByRole("heading", { name: /^12 picks, \d+ cells? to visit$/ }).waitFor();
    await page.getByText('"00391522864013975605"').first().waitFor();

    await page.getByRole("button", { name: "Repeat it yourself" }).click();
    const recipe = page.locator("pre", { hasText: "import hashlib" }).first();
    await recipe.waitFor();
    const script = join(folder, "recipe.py");
    writeFileSync(script, (await recipe.textContent()) ?? "");
    const printed = execFileSync("python3", ["-I", script], { encoding: "utf8" });
    await page.keyboard.press("Escape");
    const rows = await page.getByRole("grid", { name: "Picks in draw order" }).getByRole("row").allTextContents();
    const units = (await readVisits(page)).flatMap(({ unit, orders }) => orders.map((order) => ({ order, unit })));
    expect(rows.length).toBeGreaterThan(10);
    for (const { order, unit } of units) expect(printed).toMatch(new RegExp(`\\b${order}\\b.*\\b${unit}\\b`));
  });

  test("the lead shares the cells out and takes waypoints that fit the GPX 1.1 schema", async () => {
    const page = await as("lead");
    await stage(page, "field");
    await page.getByRole("button", { name: /^Select all/ }).click();
    await page.getByLabel("Give to").selectOption({ label: "counter of the walk (counter)" });
    await page.getByRole("button", { name: "Share out" }).click();
    await page
      .getByText(/shared out\./)
      .first()
      .waitFor();
    const gpx = await saved(page, () => page.getByRole("button", { name: "Save as GPX" }).click(), "cells.gpx");
    execFileSync("xmllint", ["--nonet", "--noout", "--schema", "tests/reference/schemas/gpx.xsd", gpx]);
    const cells = (await readVisits(page)).length;
    expect(readFileSync(gpx, "utf8").match(/<wpt /g)).toHaveLength(cells);
    const csv = await saved(page, () => page.getByRole("button", { name: "Save as CSV" }).click(), "cells.csv");
    expect(readFileSync(csv, "utf8").trim().split("\r\n")).toHaveLength(cells + 1);
  });

  test("the counter counts on a phone: a number, a zero, and a cell that is unsafe", async () => {
    const page = await as("counter", 390);
    await stage(page, "counts");
    const [first, second, third] = await readVisits(page);
    if (!first || !second || !third) throw new Error("three cells were expected");
    await page.getByRole("row", { name: new RegExp(`^${first.label}\\b`) }).click();
    await page.getByLabel("Count", { exact: true }).fill("7");
    await page.getByRole("button", { name: "Save: 7 burrows" }).click();
    await page.getByRole("form", { name: `Count of ${second.label}` }).waitFor();
    await page.getByRole("button", { name: /^Zero/ }).click();
    await page.getByRole("form", { name: `Count of ${third.label}` }).waitFor();
    await page.getByLabel("Or no count, because").selectOption("unsafe");
    await page.getByRole("button", { name: "Save: unsafe" }).click();
    await expect
      .poll(async () => (await readVisits(page)).map(({ count }) => count.state).slice(0, 3))
      .toEqual(["counted", "counted", "unsafe"]);
  });

  test("the lead closes the unsafe cell, and the next reserve opens in draw order", async () => {
    const page = await as("lead");
    await stage(page, "field");
    const unsafe = (await readVisits(page)).find(({ count }) => count.state === "unsafe");
    if (!unsafe) throw new Error("an unsafe cell was expected");
    await page.getByRole("row", { name: new RegExp(`\\b${unsafe.label}\\b`) }).click();
    await page.getByRole("button", { name: `Close ${unsafe.label}…` }).click();
    await page.getByLabel("Reason").fill("undercut bank, nobody should stand there");
    await page.getByRole("button", { name: "Close the pick" }).click();
    await page.getByText(/Opened in draw order: .*pick 13/).waitFor();
    await page.getByRole("button", { name: "Back to the list" }).click();
  });

  test("the lead reads the other counts in from a table, and nothing is written before each row was shown", async () => {
    const page = await as("lead");
    await stage(page, "counts");
    const open = (await readVisits(page)).filter(({ count }) => count.state === "not-visited");
    const table = join(folder, "counts.csv");
    const lines = open.map(({ unit, label }, index) => `${unit};${label};${(index * 5) % 9}`);
    writeFileSync(table, ["unit;cell;burrows", ...lines, "999999;ZZ99;4"].join("\n"));
    await page.locator("input[type=file]").first().setInputFiles(table);
    await page.getByText("not drawn, not used").first().waitFor();
    expect((await readVisits(page)).filter(({ count }) => count.state === "not-visited")).toHaveLength(open.length);
    await page.getByRole("button", { name: `Write ${open.length} counts` }).click();
    await page.getByText(`${open.length} counts are written.`).waitFor();
  });

  test("an amendment needs a reason and keeps the old value", async () => {
    const page = await as("lead");
    await stage(page, "counts");
    const seven = (await readVisits(page)).find(({ count }) => count.state === "counted" && count.value === 7);
    if (!seven) throw new Error("the count of 7 was expected");
    await page.getByRole("row", { name: new RegExp(`^${seven.label}\\b`) }).click();
    await page.getByRole("button", { name: "Amend…" }).click();
    await page.getByLabel("Count", { exact: true }).fill("6");
    await page.getByRole("button", { name: "Amend to 6 burrows" }).click();
    await page.getByText("Say why: it stands in the record.").waitFor();
    await page.getByLabel("Why it is amended").fill("one entrance counted twice, photo 3");
    await page.getByRole("button", { name: "Amend to 6 burrows" }).click();
    await expect.poll(async () => (await readVisits(page)).find(({ id }) => id === seven.id)?.count.value).toBe(6);
  });

  test("the planner reads the estimate and keeps it", async () => {
    const page = await as("planner");
    await stage(page, "estimate");
    await page
      .getByRole("heading", {
        level: 1,
        name: /^About .* burrows are in the study area, with 95.% confidence limits of/,
      })
      .waitFor();
    await page.getByRole("button", { name: "Keep this estimate" }).click();
    await page.getByText(/On record as it stands/).waitFor();
  });

  test("the auditor replays the record in their own browser, without an account, and every check passes", async () => {
    const page = await as("auditor");
    await stage(page, "record");
    recordFile = await saved(
      page,
      () => page.getByRole("link", { name: "Save the record file" }).click(),
      "record.json",
    );
    const outside = (await person(browser)).page;
    await replay(outside, recordFile);
    await outside.getByText(/\d+ of \d+ checks pass/).waitFor();
    expect(await outside.locator("[data-outcome=failed]").count()).toBe(0);
    await outside.close();
  });

  test("one changed count in a copy of the record is found and named", async () => {
    const record = JSON.parse(readFileSync(recordFile, "utf8")) as { counts: { value: number | null }[] };
    const changed = record.counts.find(({ value }) => value !== null && value > 0);
    if (!changed) throw new Error("a count above zero was expected");
    changed.value = (changed.value ?? 0) + 1;
    const copy = join(folder, "tampered.json");
    writeFileSync(copy, JSON.stringify(record));
    const { page } = await person(browser);
    await replay(page, copy);
    const failed = page.locator("[data-outcome=failed]").first();
    await failed.waitFor();
    expect(await failed.textContent()).toContain(String(changed.value));
    await page.close();
  });

  test("no page of the walk threw or logged an error", async () => {
    for (const page of pages.values()) await page.close();
    expect(errors).toEqual([]);
  });
});

async function replay(page: Page, file: string): Promise<void> {
  await page.goto(`${base}/replay`);
  await page.locator("input[type=file]").first().setInputFiles(file);
  await page.getByRole("button", { name: "Replay this record" }).click();
}

interface SeenVisit {
  readonly id: string;
  readonly unit: number;
  readonly label: string;
  readonly orders: readonly number[];
  readonly count: { readonly state: string; readonly value?: number };
}

/** What the server tells this person of the cells to visit. */
async function readVisits(page: Page): Promise<readonly SeenVisit[]> {
  const response = await page.request.get(`${base}/api${survey}/visits`);
  return ((await response.json()) as { visits: SeenVisit[] }).visits;
}
