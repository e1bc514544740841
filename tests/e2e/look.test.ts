import { readFileSync } from "node:fs";
import { AxeBuilder } from "@axe-core/playwright";
import type { Browser, Locator, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, inject, test } from "vitest";
import { launch, person } from "./browser.ts";
import { ownerPage, startSurvey } from "./signed-in.ts";

// What the parts of the pages look like as a browser computes it, against src/styles/tokens.css as it stands in the file: once as they
// are, once with the token changed in the page. A part that writes a colour or a size of its own is found by the second, even where
// its value happens to be the same. Then the pages that anybody reaches, looked through by axe at a phone's and a desk's width.

const base = inject("base");
const TOKENS = lightTokens(readFileSync("src/styles/tokens.css", "utf8"));

let browser: Browser;
let desk: Page;
let surveyId = "";

beforeAll(async () => {
  browser = await launch();
  desk = (await ownerPage(browser)).page;
  surveyId = await startSurvey(desk, "Ludden Fold");
  await desk.emulateMedia({ reducedMotion: "reduce", colorScheme: "light" });
});

afterAll(async () => {
  await browser.close();
});

interface Part {
  readonly part: string;
  readonly open: () => Promise<Locator>;
  /** CSS property → token. */
  readonly wears: Readonly<Record<string, string>>;
}

const PARTS: readonly Part[] = [
  {
    part: "the primary button",
    open: async () => {
      await desk.goto(`${base}/surveys/new`);
      return desk.locator(".q-button-primary:enabled").first();
    },
    wears: {
      "background-color": "--color-act",
      color: "--color-on-act",
      "font-family": "--font-sans",
      "font-size": "--text-body",
      "border-top-left-radius": "--radius-field",
      height: "--size-control",
    },
  },
  {
    part: "a quiet button",
    open: async () => {
      await desk.goto(`${base}/account`);
      return desk.locator(".q-button-quiet:enabled").first();
    },
    wears: {
      "background-color": "--color-sheet",
      "border-top-color": "--color-rule-2",
      color: "--color-ink",
      "font-family": "--font-sans",
      "font-size": "--text-body",
      "border-top-left-radius": "--radius-field",
      height: "--size-control",
    },
  },
  {
    part: "the box of a text input",
    open: async () => {
      await desk.goto(`${base}/surveys/new`);
      return desk.getByLabel("Name of the survey").locator("xpath=..");
    },
    wears: {
      "background-color": "--color-sheet",
      "border-top-color": "--color-rule-2",
      "border-top-left-radius": "--radius-field",
      height: "--size-control",
    },
  },
  {
    part: "what is typed into a text input",
    open: async () => {
      await desk.goto(`${base}/surveys/new`);
      return desk.getByLabel("Name of the survey");
    },
    wears: { color: "--color-ink", "font-family": "--font-sans", "font-size": "--text-body" },
  },
  {
    part: "the heading of a reading page",
    open: async () => {
      await desk.goto(`${base}/surveys/new`);
      return desk.getByRole("heading", { level: 1 });
    },
    wears: { color: "--color-ink", "font-family": "--font-serif", "font-size": "--text-h1" },
  },
  {
    part: "help below a field",
    open: async () => {
      await desk.goto(`${base}/surveys/new`);
      return desk.locator("p.q-help").first();
    },
    wears: { color: "--color-ink-3", "font-family": "--font-sans", "font-size": "--text-small" },
  },
  {
    part: "the head of a table",
    open: async () => {
      await desk.goto(`${base}/surveys/${surveyId}/people`);
      return desk.getByRole("columnheader", { name: "E-mail" });
    },
    wears: {
      color: "--color-ink-2",
      "border-bottom-color": "--color-ink",
      "font-family": "--font-sans",
      "font-size": "--text-note",
    },
  },
  {
    part: "the station of the stage that is open",
    open: async () => {
      await desk.goto(`${base}/surveys/${surveyId}/area`);
      return desk.locator(".q-station[aria-current=page]").first();
    },
    wears: { "background-color": "--color-sunk", color: "--color-ink", "font-family": "--font-sans" },
  },
  {
    part: "the page itself",
    open: async () => {
      await desk.goto(`${base}/surveys/new`);
      return desk.locator("body");
    },
    wears: { "background-color": "--color-paper", color: "--color-ink", "font-family": "--font-sans" },
  },
];

describe("the look", () => {
  test.each(PARTS)("$part wears the tokens, and changes with them", async ({ open, wears }) => {
    const part = await open();
    await part.waitFor();
    const properties = Object.keys(wears);
    const seen = await stylesOf(part, properties);
    const expected = Object.fromEntries(Object.entries(wears).map(([property, token]) => [property, valueOf(token)]));
    expect(seen).toEqual(expected);
    for (const [property, token] of Object.entries(wears)) {
      const other = otherThan(token);
      await setToken(part, token, other);
      expect(await stylesOf(part, [property]), `${property} with another ${token}`).toEqual({
        [property]: written(other),
      });
      await setToken(part, token, null);
    }
  });
});

describe("axe finds nothing serious", () => {
  const pages = [
    { path: "/sign-in", who: () => person(browser) },
    { path: "/replay", who: () => person(browser) },
    { path: "/reset", who: () => person(browser) },
    { path: `/invitation/${"x".repeat(43)}`, who: () => person(browser) },
    { path: "/surveys", who: () => ownerPage(browser) },
    { path: "/account", who: () => ownerPage(browser) },
  ];
  const cases = pages.flatMap((each) => [390, 1280].map((width) => ({ ...each, width })));

  // Rules of WCAG 2.2 A and AA and axe's own advice; minor and moderate advice is left to people.
  test.each(cases)("on $path at $width px", async ({ path, who, width }) => {
    const { page } = await who();
    await page.setViewportSize({ width, height: 800 });
    await page.emulateMedia({ reducedMotion: "reduce", colorScheme: "light" });
    await page.goto(`${base}${path}`);
    await page.getByRole("heading", { level: 1 }).first().waitFor();
    await page.waitForLoadState("networkidle");
    const { violations, passes } = await new AxeBuilder({ page }).analyze();
    expect(passes.length).toBeGreaterThan(10);
    const grave = violations
      .filter(({ impact }) => impact === "serious" || impact === "critical")
      .map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(" ")).join(", ")}`);
    expect(grave).toEqual([]);
    await page.context().close();
  });
});

/** The custom properties of the light theme at a desk's width: the @theme block, then the first rule of the light root. */
function lightTokens(css: string): ReadonlyMap<string, string> {
  const plain = css.replaceAll(/\/\*[^]*?\*\//g, "");
  const theme = /@theme static \{([^}]*)\}/.exec(plain)?.[1];
  const root = /:root,\s*\[data-theme="light"\] \{([^}]*)\}/.exec(plain)?.[1];
  if (theme === undefined || root === undefined) throw new Error("tokens.css has no light theme where it was expected");
  const pairs = [...`${theme}${root}`.matchAll(/(--[\w-]+):\s*([^;]+);/g)];
  return new Map(pairs.map(([, name = "", value = ""]) => [name, value.trim()]));
}

function valueOf(token: string): string {
  const value = TOKENS.get(token);
  if (value === undefined) throw new Error(`${token} is not in tokens.css`);
  return written(value);
}

/** A value as a browser writes it when it is asked for the computed one: colours as rgb(), families with quotes only where they were. */
function written(value: string): string {
  const hex = /^#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/i.exec(value);
  if (hex)
    return `rgb(${hex
      .slice(1)
      .map((part) => Number.parseInt(part, 16))
      .join(", ")})`;
  return value.replaceAll(/\s+/g, " ");
}

/** A value of the same kind that no token has. */
function otherThan(token: string): string {
  if (token.startsWith("--color-")) return "#0b16a1";
  if (token.startsWith("--font-")) return '"Some Other Face", cursive';
  return token.startsWith("--size-") ? "73px" : "19px";
}

/** Sets a token on the root, or takes that back. */
async function setToken(part: Locator, token: string, value: string | null): Promise<void> {
  await part.evaluate(
    (_, [name, other]) => {
      if (other === null) document.documentElement.style.removeProperty(name);
      else document.documentElement.style.setProperty(name, other);
    },
    [token, value] as const,
  );
  await part.evaluate(() => new Promise((resolve) => requestAnimationFrame(() => setTimeout(resolve, 20))));
}

function stylesOf(part: Locator, properties: readonly string[]): Promise<Record<string, string>> {
  return part.evaluate((element, names) => {
    const style = getComputedStyle(element);
    return Object.fromEntries(names.map((name) => [name, style.getPropertyValue(name)]));
  }, properties);
}
