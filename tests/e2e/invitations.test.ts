import { mkdtempSync, readFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, inject, test } from "vitest";
import { launch, person } from "./browser.ts";
import { accept, linkTo } from "./invited.ts";
import { ownerPage, startSurvey } from "./signed-in.ts";

// How people get into a survey, each in their own browser: invited on the People page, by a mail that went over SMTP, by its link and a
// password of their own, to the first thing that their role has to do. Then how somebody gets out: at their next request.
// Each test goes on from where the one before left off.

const base = inject("base");
const PASSWORD = "a sentence of their own";
const folder = mkdtempSync(join(tmpdir(), "quillet-invited-"));
const roles = ["planner", "lead", "counter", "auditor"] as const;
type Role = (typeof roles)[number];

let browser: Browser;
let owner: Page;
let survey = "";
const pages = new Map<Role, Page>();
const errors: (readonly string[])[] = [];

beforeAll(async () => {
  browser = await launch();
  const own = await ownerPage(browser);
  owner = own.page;
  errors.push(own.errors);
  survey = `/surveys/${await startSurvey(owner, "Saltern Marsh")}`;
});

afterAll(async () => {
  await browser.close();
});

const addressOf = (role: Role) => `${role}.invited@example.org`;

/** Somebody's own browser, gone in by the link of their mail. */
async function comeIn(role: Role, width = 1280): Promise<Page> {
  const { page, errors: logged } = await person(browser, width);
  errors.push(logged);
  pages.set(role, page);
  await accept(page, addressOf(role), { name: `${role} invited`, password: PASSWORD });
  return page;
}

function pageOf(role: Role): Page {
  const page = pages.get(role);
  if (!page) throw new Error(`the ${role} has not come in`);
  return page;
}

/** Squares of 50 m, sealed; twelve picks from a typed seed. */
async function sealAndDraw(page: Page): Promise<void> {
  await page.goto(`${base}${survey}/frame`);
  await page.getByLabel("Square, side").fill("50");
  await page.waitForTimeout(1500); // the preview of the new size, then the draft
  await page.getByRole("button", { name: /^Seal the frame: \d/ }).click();
  await page.getByText("version 1, sealed").first().waitFor();
  await page.goto(`${base}${survey}/draw`);
  await page.getByLabel("Picks, n").fill("12");
  await page.getByRole("radio", { name: /^Typed/ }).check();
  await page.getByRole("button", { name: "Declare the draw" }).click();
  await page.getByLabel("Seed", { exact: true }).fill("7306291");
  await page.getByRole("button", { name: "Draw with this seed" }).click();
  await page.getByRole("heading", { name: /^12 picks, \d+ cells? to visit$/ }).waitFor();
}

describe("into a survey by a mail", () => {
  test("the planner of a survey invites four addresses that have no account", async () => {
    await owner.goto(`${base}${survey}/people`);
    for (const role of roles) {
      await owner.getByLabel("E-mail").fill(addressOf(role));
      await owner.getByRole("radio", { name: new RegExp(`^${role}`, "i") }).check();
      await owner.getByRole("button", { name: "Add to the survey" }).click();
      await owner.getByRole("row", { name: new RegExp(`^${addressOf(role)} ${role} `) }).waitFor();
      await expect.poll(() => owner.getByLabel("E-mail").inputValue()).toBe("");
    }
  });

  test("the planner's link leads to the Area stage, where the boundary is imported", async () => {
    const page = await comeIn("planner");
    expect(page.url()).toBe(`${base}${survey}/area`);
    await page
      .locator("input[type=file]")
      .first()
      .setInputFiles("tests/reference/imports/made/good_polygon_hole.geojson");
    await page.getByText("good_polygon_hole.geojson").first().waitFor();
    await page.getByRole("figure").first().waitFor();
    await sealAndDraw(page);
  });

  test("a link works once: after it was used it says so, and whom to ask", async () => {
    const { page } = await person(browser);
    await page.goto(await linkTo(addressOf("planner"), "/invitation/"));
    await page.getByRole("heading", { level: 1, name: "This invitation has ended." }).waitFor();
    await page.getByText(/Ask whoever invited you for a new one/).waitFor();
    await page.close();
  });

  test("the counter comes in on a phone, to a stage of their own", async () => {
    const page = await comeIn("counter", 390);
    expect(page.url()).toMatch(/\/(field|counts)$/);
    await page.getByRole("heading", { level: 1 }).waitFor();
  });

  test("the lead's link leads to the Field stage, where a cell is shared out to the counter", async () => {
    const page = await comeIn("lead");
    expect(page.url()).toBe(`${base}${survey}/field`);
    await page.getByRole("button", { name: /^Select all/ }).click();
    await page.getByLabel("Give to").selectOption({ label: "counter invited (counter)" });
    await page.getByRole("button", { name: "Share out" }).click();
    await page
      .getByText(/shared out\./)
      .first()
      .waitFor();
  });

  test("the counter finds the cells waiting and enters a count", async () => {
    const page = pageOf("counter");
    await page.goto(`${base}/surveys`);
    await page.getByRole("link", { name: "Enter counts" }).click();
    await page.waitForURL(`${base}${survey}/counts`);
    const [first] = await visitsOf(page);
    if (!first) throw new Error("an assigned cell was expected");
    await page.getByRole("row", { name: new RegExp(`^${first.label}\\b`) }).click();
    await page.getByLabel("Count", { exact: true }).fill("4");
    await page.getByRole("button", { name: "Save: 4 burrows" }).click();
    await expect.poll(async () => (await visitsOf(page))[0]?.count.state).toBe("counted");
  });

  test("the auditor is given the key's fingerprint before and in the mail, and saves the record file", async () => {
    const { page, errors: logged } = await person(browser);
    errors.push(logged);
    pages.set("auditor", page);
    await page.goto(await linkTo(addressOf("auditor"), "/invitation/"));
    const told = (await page.locator(".q-hash-block").textContent()) ?? "";
    expect(told).toMatch(/^[0-9a-f]{64}$/);
    const mail = await fetch(`${inject("mailbox")}/?to=${addressOf("auditor")}`);
    expect(await mail.text()).toContain(told);
    await accept(page, addressOf("auditor"), { name: "auditor invited", password: PASSWORD });
    expect(page.url()).toBe(`${base}${survey}/record`);
    const [download] = await Promise.all([
      page.waitForEvent("download"),
      page.getByRole("link", { name: "Save the record file" }).click(),
    ]);
    const file = join(folder, "record.json");
    await download.saveAs(file);
    const record = readFileSync(file, "utf8");
    expect(record).toContain('"quillet-record/1"');
    for (const role of roles) expect(record).not.toContain(addressOf(role));
  });
});

describe("a forgotten password", () => {
  test("is replaced by a link from a mail, and the sessions before it have ended", async () => {
    const { page } = await person(browser);
    await page.goto(`${base}/sign-in`);
    await page.getByRole("link", { name: "Forgot the password" }).click();
    await page.getByLabel("E-mail").fill(addressOf("lead"));
    await page.getByRole("button", { name: "Send me a link" }).click();
    await page.getByRole("heading", { level: 1, name: "Look into your mail." }).waitFor();
    await page.goto(await linkTo(addressOf("lead"), "/reset/"));
    await page.getByLabel("New password", { exact: true }).fill("another sentence of theirs");
    await page.getByRole("button", { name: "Set the password and sign in" }).click();
    await page.waitForURL(`${base}/surveys`);
    const before = await pageOf("lead").request.get(`${base}/api${survey}/visits`);
    expect(before.status()).toBe(401);
    await page.close();
  });
});

describe("out of a survey", () => {
  test("who is removed is out at their next request, keeps what they typed until they sign in again, and finds no survey", async () => {
    const page = pageOf("counter");
    const open = (await visitsOf(page)).find(({ count }) => count.state === "not-visited");
    if (!open) throw new Error("a cell to count was expected");
    await page.goto(`${base}${survey}/counts`);
    await page.getByRole("row", { name: new RegExp(`^${open.label}\\b`) }).click();
    await page.getByLabel("Count", { exact: true }).fill("9");

    await owner.goto(`${base}${survey}/people`);
    await owner.getByRole("button", { name: "Remove counter invited…" }).click();
    await owner.getByRole("dialog").getByRole("button", { name: "Remove counter invited" }).click();
    await owner.getByRole("dialog").waitFor({ state: "detached" });

    const answered = page.waitForResponse((response) => response.request().method() === "POST");
    await page.getByRole("button", { name: "Save: 9 burrows" }).click();
    expect((await answered).status()).toBe(401);
    const dialog = page.getByRole("dialog", { name: "Sign in again to go on" });
    await dialog.waitFor();
    expect(await page.getByLabel("Count", { exact: true }).inputValue()).toBe("9");
    await dialog.getByLabel("Password", { exact: true }).fill(PASSWORD);
    await dialog.getByRole("button", { name: "Sign in" }).click();
    await page.getByText("There is no such survey here.").waitFor();
    expect((await page.request.get(`${base}/api${survey}/visits`)).status()).toBe(404);
  });

  test("no page threw or logged an error", () => {
    expect(errors.flat()).toEqual([]);
  });
});

interface SeenVisit {
  readonly label: string;
  readonly count: { readonly state: string };
}

/** What the server tells this person of the cells to visit. */
async function visitsOf(page: Page): Promise<readonly SeenVisit[]> {
  const response = await page.request.get(`${base}/api${survey}/visits`);
  return ((await response.json()) as { visits: SeenVisit[] }).visits;
}
