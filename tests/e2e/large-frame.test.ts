import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, inject, test } from "vitest";
import { launch } from "./browser.ts";
import { importBoundary, ownerPage, startSurvey } from "./signed-in.ts";

// A boundary of 10,000 vertices, about 10 km across, under squares of about 10 m: a million cells. What a planner waits for, whether
// the page stays awake meanwhile, and whether the server answers others while it seals.

const base = inject("base");
const VERTICES = 10_000;
const RADIUS_M = 5642;
const WAVE = 0.04;
/** Sides in metres, and an empty draft's side before them. All three give between 0.95 and 1.05 million cells. */
const SIDES = ["10", "10.2", "9.8"] as const;
const MOST_WAITING_MS = 1000;
const MOST_TASK_MS = 50;
const MOST_ANSWER_MS = 500;
/** How long after the number is told its tiles are still being painted. */
const SETTLE_MS = 500;

let browser: Browser;
let page: Page;
let errors: readonly string[];
let surveyId = "";

beforeAll(async () => {
  browser = await launch();
  ({ page, errors } = await ownerPage(browser));
  surveyId = await startSurvey(page, "Wide Fell");
  await importBoundary(page, surveyId, "wide-fell.geojson", wavyRing());
  await page.addInitScript(observeTasks);
});

afterAll(async () => {
  await browser.close();
});

describe("a million cells", () => {
  // Wave of 60 periods on a circle: its area is π r² (1 + w²/2) on the sphere's tangent, and a cell's size decides the number;
  // cells on the edge count as cells of their own under clip, so a little more.
  // The machine may be doing other things: the best of three sizes has to hold, and each size is measured once, without a second try.
  // For the same reason a task over 50 ms is held against the page only when the thread itself worked for more than 50 ms in it: a
  // task that waits while another program has the processor is printed, not refused. On an idle machine the two are the same.
  test("are laid out and told within a second of the last key, and no task works for over 50 ms", async () => {
    await page.goto(`${base}/surveys/${surveyId}/frame`);
    await page.getByRole("button", { name: /^Seal the frame: \d/ }).waitFor();
    await page.getByRole("figure").first().waitFor();
    await page.waitForTimeout(1500);
    const runs = [];
    for (const side of SIDES) {
      runs.push(await measure(side));
      await page.waitForTimeout(1500); // the draft is kept, the tiles are painted
    }
    const mostWork = runs.map(({ tasks }) => Math.max(...tasks.map(({ worked }) => worked)));
    for (const [index, { side, cells, waitedMs, tasks, longMs }] of runs.entries())
      process.stdout.write(
        `${side} m: ${cells} cells in ${waitedMs} ms; ${tasks.length} tasks, the hardest worked ${mostWork[index]?.toFixed(1) ?? ""} ms; long by the clock: ${longMs.join(", ") || "none"}\n`,
      );
    for (const { side, cells } of runs) {
      const expected = (Math.PI * RADIUS_M ** 2 * (1 + WAVE ** 2 / 2)) / Number(side) ** 2;
      expect(cells / expected).toBeGreaterThan(0.995);
      expect(cells / expected).toBeLessThan(1.015);
    }
    expect(Math.min(...runs.map(({ waitedMs }) => waitedMs))).toBeLessThanOrEqual(MOST_WAITING_MS);
    for (const { tasks } of runs) expect(tasks.reduce((sum, { worked }) => sum + worked, 0)).toBeGreaterThan(5);
    expect(Math.min(...mostWork)).toBeLessThanOrEqual(MOST_TASK_MS);
    expect(errors).toEqual([]);
  });

  test("are sealed while the server answers everybody else within half a second", async () => {
    const seal = page.getByRole("button", { name: /^Seal the frame: \d/ });
    await seal.waitFor();
    const sealed = page.getByText("version 1, sealed").first().waitFor({ timeout: 80_000 });
    let done = false;
    const watched = sealed.finally(() => (done = true));
    const begun = performance.now();
    const answers: number[] = [];
    const ask = async (path: string) => {
      while (!done) {
        const asked = performance.now();
        const response = await fetch(`${base}${path}`);
        await response.arrayBuffer();
        answers.push(performance.now() - asked);
        expect(response.status).toBe(200);
        await new Promise((resolve) => setTimeout(resolve, 10));
      }
    };
    await Promise.all([seal.click(), ask("/health"), ask("/api/session"), watched]);
    const slowest = Math.max(...answers);
    process.stdout.write(
      `sealed in ${Math.round(performance.now() - begun)} ms; ${answers.length} answers meanwhile, the slowest in ${Math.round(slowest)} ms\n`,
    );
    expect(answers.length).toBeGreaterThan(10);
    expect(slowest).toBeLessThanOrEqual(MOST_ANSWER_MS);
    expect(errors).toEqual([]);
  });
});

interface Run {
  readonly side: string;
  readonly cells: number;
  /** From the input event until the button with the new number has been painted. */
  readonly waitedMs: number;
  /** Tasks of the main thread from the input event until half a second after, when the tiles are painted too. */
  readonly tasks: readonly Task[];
  /** Those that the page itself was told of as long, by the clock. */
  readonly longMs: readonly number[];
}

/** Times in ms: by the clock, and of the thread's own work. */
interface Task {
  readonly clock: number;
  readonly worked: number;
}

interface Watched {
  tasks: { start: number; end: number }[];
}

/** Runs in the page before anything else: keeps each task of the main thread that took over 50 ms. */
function observeTasks(): void {
  const watched = globalThis as unknown as Watched;
  watched.tasks = [];
  new PerformanceObserver((list) => {
    for (const { startTime, duration } of list.getEntries())
      watched.tasks.push({ start: startTime, end: startTime + duration });
  }).observe({ entryTypes: ["longtask"] });
}

/** Types a side in one go, and measures inside the page until the number of cells for it has been painted. */
async function measure(side: string): Promise<Run> {
  await browser.startTracing(page, { categories: ["toplevel", "blink.user_timing", "__metadata"] });
  const measured = page.evaluate(untilTold);
  await page.getByLabel("Square, side").fill(side);
  const { from, to, cells } = await measured;
  await page.waitForTimeout(SETTLE_MS);
  const trace = await browser.stopTracing();
  const long = await page.evaluate(() => (globalThis as unknown as Watched).tasks);
  return {
    side,
    cells,
    waitedMs: Math.round(to - from),
    tasks: tasksOf(trace.toString("utf8")),
    longMs: long
      .filter(({ start, end }) => end > from && start < to + SETTLE_MS)
      .map(({ start, end }) => Math.round(end - start)),
  };
}

interface TraceEvent {
  readonly name: string;
  readonly pid: number;
  readonly tid: number;
  /** Microseconds: when, how long by the clock, how long the thread worked. */
  readonly ts: number;
  readonly dur?: number;
  readonly tdur?: number;
}

/** The tasks of the thread that set the two marks, between them and a little longer. */
function tasksOf(trace: string): Task[] {
  const { traceEvents } = JSON.parse(trace) as { traceEvents: TraceEvent[] };
  const from = traceEvents.find(({ name }) => name === "size typed");
  const to = traceEvents.find(({ name }) => name === "cells told");
  if (from === undefined || to === undefined) throw new Error("the trace holds no marks");
  const own = traceEvents.filter(
    ({ name, pid, tid }) => name.endsWith("RunTask") && pid === from.pid && tid === from.tid,
  );
  return own
    .filter(({ ts, dur = 0 }) => ts + dur > from.ts && ts < to.ts + 1000 * SETTLE_MS)
    .map(({ dur = 0, tdur = 0 }) => ({ clock: dur / 1000, worked: tdur / 1000 }));
}

/** Runs in the page: waits for an input event, then for a number of cells on the button that is not the one before. */
function untilTold(): Promise<{ from: number; to: number; cells: number }> {
  const told = () => {
    for (const button of document.querySelectorAll("button")) {
      const words = /^Seal the frame: ([\d\u202f]+) cells?$/.exec(button.textContent.trim());
      if (words?.[1] !== undefined) return Number(words[1].replaceAll("\u202f", ""));
    }
    return null;
  };
  const before = told();
  return new Promise((resolve) => {
    const onInput = (event: Event) => {
      document.removeEventListener("input", onInput, true);
      performance.mark("size typed");
      const observer = new MutationObserver(() => {
        const cells = told();
        if (cells === null || cells === before) return;
        observer.disconnect();
        requestAnimationFrame(() => {
          setTimeout(() => {
            performance.mark("cells told");
            resolve({ from: event.timeStamp, to: performance.now(), cells });
          }, 0);
        });
      });
      observer.observe(document.body, { subtree: true, childList: true, characterData: true });
    };
    document.addEventListener("input", onInput, true);
  });
}

/** A circle whose radius waves 60 times around; degrees on the plane that touches the sphere at 9° E, 52° N. */
function wavyRing() {
  const perDegree = 111_260;
  const ring = Array.from({ length: VERTICES }, (_, index) => {
    const angle = (2 * Math.PI * index) / VERTICES;
    const radius = RADIUS_M * (1 + WAVE * Math.sin(60 * angle));
    const lng = 9 + (radius * Math.cos(angle)) / (perDegree * 1.0029 * Math.cos((52 * Math.PI) / 180));
    return [Number(lng.toFixed(9)), Number((52 + (radius * Math.sin(angle)) / perDegree).toFixed(9))];
  });
  const [first] = ring;
  return {
    type: "FeatureCollection",
    features: [{ type: "Feature", properties: {}, geometry: { type: "Polygon", coordinates: [[...ring, first]] } }],
  };
}
