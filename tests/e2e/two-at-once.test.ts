import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, inject, test } from "vitest";
import { launch, person } from "./browser.ts";
import { accept } from "./invited.ts";
import { ownerPage, startSurvey } from "./signed-in.ts";

// Two planners in two browsers open the settings of one survey. One keeps a change; the other, who still sees what was there
// before, is shown both versions, takes theirs in one field and keeps their own in another; then both see the same.

const base = inject("base");

let browser: Browser;
const errors: string[] = [];

beforeAll(async () => {
  browser = await launch();
});

afterAll(async () => {
  await browser.close();
});

/** Another planner of the survey in a browser of their own, at a phone's width: invited, and in by the link of their mail. */
async function secondPlanner(first: Page, surveyId: string): Promise<Page> {
  const email = "second.planner@example.org";
  const people = `${base}/api/surveys/${surveyId}/people`;
  const response = await first.request.post(people, { data: { email, role: "planner" } });
  expect(response.status(), await response.text()).toBe(200);
  const { page, errors: own } = await person(browser, 390);
  page.on("close", () => errors.push(...own));
  await accept(page, email, { name: "Second Planner", password: "a sentence of their own" });
  return page;
}

async function openSettings(page: Page, surveyId: string): Promise<void> {
  await page.goto(`${base}/surveys/${surveyId}/settings`);
  await page.getByLabel("Name of the survey").waitFor();
}

const nameOn = (page: Page) => page.getByLabel("Name of the survey").inputValue();
const keep = (page: Page) => page.getByRole("button", { name: "Keep the settings" }).click();

test("two planners change the settings at once, and the second says what is to stand", async () => {
  const { page: one, errors: own } = await ownerPage(browser);
  const surveyId = await startSurvey(one, "Wherry Marsh");
  const two = await secondPlanner(one, surveyId);
  await openSettings(one, surveyId);
  await openSettings(two, surveyId);

  await two.getByLabel("Name of the survey").fill("Wherry Marsh, south");
  await two.getByLabel("Confidence level").fill("90");
  await one.getByLabel("Name of the survey").fill("Wherry Marsh, north");
  await one.getByLabel("What people must know before they go out").fill("The tide comes in from behind.");
  await keep(one);
  await one.getByText("The settings are kept.").waitFor();

  await keep(two);
  await two.getByRole("heading", { name: "Both versions" }).waitFor();
  const field = (name: string) => two.getByRole("group", { name, exact: true });
  const radio = (name: string, choice: RegExp) => field(name).getByRole("radio", { name: choice });
  expect(await field("Name of the survey").textContent()).toContain("Wherry Marsh, north");
  expect(await field("Name of the survey").textContent()).toContain("Wherry Marsh, south");
  // Only one of the two changed these: that one's is chosen already.
  expect(await radio("Safety notes", /^Take theirs/).isChecked()).toBe(true);
  expect(await radio("Confidence level", /^Keep mine/).isChecked()).toBe(true);
  const decide = two.getByRole("button", { name: "Keep what is chosen" });
  expect(await decide.isDisabled()).toBe(true);
  const wide = await two.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth);
  expect(wide).toBe(true);
  await radio("Name of the survey", /^Keep mine/).check();
  await decide.click();
  await two.getByText("The settings are kept.").waitFor();

  for (const page of [one, two]) {
    await openSettings(page, surveyId);
    expect(await nameOn(page)).toBe("Wherry Marsh, south");
    expect(await page.getByLabel("Confidence level").inputValue()).toBe("90");
    expect(await page.getByLabel("What people must know before they go out").inputValue()).toBe(
      "The tide comes in from behind.",
    );
  }
  // Each change is on record, with what stood before it.
  await one.goto(`${base}/surveys/${surveyId}/record`);
  await one.getByRole("heading", { level: 1 }).waitFor();
  await expect.poll(() => one.getByText(/settings/i).count()).toBeGreaterThan(1);
  await two.close();
  expect([...own, ...errors]).toEqual([]);
});
