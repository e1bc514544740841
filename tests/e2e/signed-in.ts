import type { Browser, Page } from "playwright-core";
import { expect, inject } from "vitest";
import { person } from "./browser.ts";

/** A page of somebody who is signed in, with whatever it logged or threw as an error. */
export interface SignedInPage {
  readonly page: Page;
  readonly errors: readonly string[];
}

/** Signs the owner in by the API, in a browser profile of their own. The page is still empty. */
export async function ownerPage(browser: Browser, width = 1280): Promise<SignedInPage> {
  const { page, errors } = await person(browser, width);
  const credentials = { email: inject("ownerEmail"), password: inject("ownerPassword") };
  const response = await page.request.post(`${inject("base")}/api/session`, { data: credentials });
  expect(response.status()).toBe(200);
  return { page, errors };
}

/** Starts a survey as who is signed in, who is its planner by that. Returns its id. */
export async function startSurvey(page: Page, name: string): Promise<string> {
  const response = await page.request.post(`${inject("base")}/api/surveys`, {
    data: {
      name,
      targetSingular: "burrow",
      targetPlural: "burrows",
      countingRule: "",
      wholeNumbers: true,
      seasonName: "2031",
      timeZone: "UTC",
      safetyNotes: "",
    },
  });
  expect(response.status(), await response.text()).toBe(200);
  return ((await response.json()) as { id: string }).id;
}

/** Imports a boundary file into a survey as its planner. */
export async function importBoundary(page: Page, surveyId: string, name: string, geojson: unknown): Promise<void> {
  const file = { name, mimeType: "application/geo+json", buffer: Buffer.from(JSON.stringify(geojson)) };
  const response = await page.request.post(`${inject("base")}/api/surveys/${surveyId}/areas`, {
    multipart: { body: "{}", file },
  });
  expect(response.status(), await response.text()).toBe(200);
}
