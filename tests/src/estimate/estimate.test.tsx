import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import { keepEstimate, type KeptEstimate, listKeptEstimates, readEstimate } from "#shared/api/estimate.ts";
import { listVisits, type Visit } from "#shared/api/field.ts";
import { readSurvey } from "#shared/api/surveys.ts";
import { estimateFromCounts } from "#shared/estimate/from-counts.ts";
import type { EstimateResult } from "#shared/estimate/result.ts";
import { Problem } from "#shared/problem.ts";
import { inputOf, valuesOf } from "../../shared/estimate/builders.ts";
import { FakeApi } from "../app/fake-api.ts";
import { session, survey } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";
import { answer, unsafe, visit, zero } from "./fixtures.ts";

vi.mock("../../../src/map/FrameSheetMap.tsx", () => ({
  FrameSheetMap: ({ label }: { label: string }) => <p>{`map: ${label}`}</p>,
}));

afterEach(() => {
  vi.unstubAllGlobals();
});

const plain = (text: string | null) => (text ?? "").replaceAll(/[\u202f\u00a0]/g, " ");

function open(told: () => ReturnType<typeof answer>, roles: Parameters<typeof survey>[0] = ["planner"]) {
  const kept: KeptEstimate[] = [];
  const visits: Visit[] = [];
  const api = new FakeApi()
    .on(readSession, () => session())
    .on(readSurvey, () => survey(roles))
    .on(readEstimate, told)
    .on(listKeptEstimates, () => ({ estimates: kept }))
    .on(listVisits, () => ({
      drawId: "d2",
      frameId: "f1",
      targetId: "t1",
      visits,
      picks: visits.length,
      reservesLeft: 0,
      completePrefix: 0,
    }));
  return { api, kept, visits };
}

async function heading(): Promise<string> {
  return plain((await screen.findByRole("heading", { level: 1 })).textContent);
}

function show(result: EstimateResult, part: Parameters<typeof answer>[1] = {}) {
  const stage = open(() => answer(result, part));
  stage.api.install();
  renderApp("/surveys/s1/estimate");
  return stage;
}

// N = 50, counts 4, 0, 7, 4, 1: mean 3.2, total 160 ± 62.05; C = exp(2.77645·√ln(1 + 0.387802²)) = 2.827: 56.6 to 452.3.
test("the answer is one sentence with the declared limits, and each number stands as a formula with its values", async () => {
  show(valuesOf([4, 0, 7, 4, 1]));
  await waitFor(async () => {
    expect(await heading()).toBe("About 160 spikes are in the study area, with 95 % confidence limits of 57 and 452.");
  });
  expect(screen.getByText("160 spikes").tagName).toBe("EM");
  screen.getByText("Log-normal, declared with the draw", { exact: false });
  const formulas = [...document.querySelectorAll(".q-formulas > div")].map((line) => plain(line.textContent));
  expect(formulas).toContain("ȳ = Σy / n= 16 / 53.2");
  expect(formulas).toContain("T = N · ȳ= 50 × 3.2160");
});

// Zeros: one of five. Bins 0, 1, 4, 7 hold 1, 1, 2, 1 picks of five.
test("beside each picture stands its table", async () => {
  show(valuesOf([4, 0, 7, 4, 1]));
  const counts = await screen.findByRole("table", { name: "Counts and how many picks had each", hidden: true });
  const rows = within(counts).getAllByRole("row", { hidden: true }).slice(1);
  expect(rows.map((row) => plain(row.textContent))).toEqual(["0120.0 %", "1120.0 %", "4240.0 %", "7120.0 %"]);
  screen.getByText("1 of 5 counted picks found none.");
  screen.getByRole("img", { name: /^Counts of 5 picks: 1 found no spikes, mean 3.20\./ });
  screen.getByRole("img", { name: /^Total 160; Log-normal limits 57 to 452; Student t limits/ });
  screen.getByRole("table", { name: "Estimates with their precision" });
  await screen.findByText("map: Where the spikes were counted");
});

test("the table of cells says a zero as a number and a missing count as a word", async () => {
  const stage = open(() => answer(valuesOf([0, 3])));
  stage.visits.push(visit(1, "A1", [1, 4], zero), visit(2, "B1", [2], unsafe));
  stage.api.install();
  renderApp("/surveys/s1/estimate");
  const cells = await screen.findByRole("table", { name: "Counts by cell", hidden: true });
  const rows = within(cells).getAllByRole("row", { hidden: true }).slice(1);
  expect(rows.map((row) => row.textContent)).toEqual(["A11, 40", "B12unsafe"]);
});

test("counts that could not be fetched are no empty map: the page says so and asks again", async () => {
  let lost = true;
  const stage = open(() => answer(valuesOf([0, 3])));
  stage.api
    .on(listVisits, () => {
      if (lost) throw new Problem("too-many-requests", "Wait a minute.");
      return { drawId: "d2", frameId: "f1", targetId: "t1", visits: [], picks: 0, reservesLeft: 0, completePrefix: 0 };
    })
    .install();
  renderApp("/surveys/s1/estimate");
  await screen.findByText("Wait a minute.");
  expect(screen.queryByText(/^map:/)).toBeNull();
  lost = false;
  await userEvent.click(screen.getByRole("button", { name: "Try again" }));
  await screen.findByText("map: Where the spikes were counted");
});

// One count of 4 in 50 cells: mean 4, total 200, and nothing can be said of precision.
test("a single count gives a mean, and the page says that one cell tells nothing of precision", async () => {
  show(valuesOf([4]));
  await waitFor(async () => {
    expect(await heading()).toContain("from a single cell: one cell tells nothing of precision");
  });
  const valueOf = (term: string) => screen.getByText(term, { selector: "dt" }).nextElementSibling?.textContent;
  expect(valueOf("Mean per cell")).toBe("4.00");
  expect(valueOf("Standard error of the total")).toBe("one pick only");
  screen.getByText("There are no limits to draw; the sentence above says why.");
  expect(screen.queryByRole("img", { name: /^Total/ })).toBeNull();
});

// N·(−ln α)/m: 50 × 3.688879/4 = 46.1 two-sided, 50 × 2.995732/4 = 37.4 one-sided; printed up to the next whole number.
test("where nothing was found the upper limits stand with their model, in sentence and table", async () => {
  show(valuesOf([0, 0, 0, 0]));
  await waitFor(async () => {
    expect(await heading()).toBe(
      "No spikes were found in 4 cells. If they lie independently of each other, at most 47 are in the study area, with 95 % confidence (two-sided; one-sided 38).",
    );
  });
  screen.getByText(/under a model in which objects lie independently \(Poisson\)/);
  const table = within(screen.getByRole("table", { name: "Estimates with their precision" }));
  expect(table.getByRole("row", { name: /Poisson limit, two-sided/ }).textContent).toContain("47");
  expect(table.getByRole("row", { name: /Poisson limit, one-sided/ }).textContent).toContain("38");
  expect(table.queryByRole("row", { name: /log-normal/ })).toBeNull();
});

// Counts 4, 0, 7 of five picks, N = 50: with two zeros 50 × 11/5 = 110, with 7 twice 50 × 25/5 = 250; SE of 101 rounds to tens.
test("uncounted picks are named with their states and the bounds that they leave open", async () => {
  show(estimateFromCounts(inputOf([1, 2, 3, 4, 5], { 1: 4, 2: 0, 3: 7, 4: { state: "unsafe" } })));
  await screen.findByText("2 picks of 5 have no count: 4 (A4, unsafe) and 5 (A5, not visited yet).");
  const said = plain(document.querySelector(".q-banner-ochre")?.textContent ?? "");
  expect(said).toContain("They are not zeros.");
  expect(said).toContain(
    "Had both held none, it would be 110; had both held 7, the 95th percentile of the counts, 250.",
  );
});

test("limits that were declared after the first count are labelled", async () => {
  show(valuesOf([4, 0, 7]), { chosenAfterCounts: ["limits", "level"] });
  await screen.findByText(/chosen after counts were seen/);
  expect(screen.queryByText(/declared with the draw/)).toBeNull();
});

// 1.6 in at most 16 classes: a width of 0.1. The zeros have their own.
test("measured amounts stand in classes whose edges belong to one class only", async () => {
  show(valuesOf([0, 0.1, 1.6]));
  const table = await screen.findByRole("table", { name: "Counts and how many picks had each", hidden: true });
  const heads = within(table).getAllByRole("rowheader", { hidden: true });
  expect(heads.map((head) => head.textContent)).toEqual(["0", "above 0, at most 0.1", "above 1.5, at most 1.6"]);
});

function keptOf(result: EstimateResult, resultSha256: string): KeptEstimate {
  return {
    id: "k1",
    seasonId: "y1",
    targetId: "t1",
    keptAt: "2031-07-09T10:00:00Z",
    keptBy: "Ines Marrow",
    resultSha256,
    result,
  };
}

test("keeping sends the result that was seen, once, and the page says that it is on record", async () => {
  const result = valuesOf([4, 0, 7]);
  const { api, kept } = open(() => answer(result));
  api
    .on(keepEstimate, ({ body }) => {
      const one = keptOf(result, body.resultSha256);
      kept.unshift(one);
      return one;
    })
    .install();
  renderApp("/surveys/s1/estimate");
  await userEvent.dblClick(await screen.findByRole("button", { name: "Keep this estimate" }));
  const said = await screen.findByText(/^On record as it stands,/);
  expect(api.named("keepEstimate").map((call) => call.body)).toEqual([{ resultSha256: "ab".repeat(32) }]);
  expect(screen.queryByRole("button", { name: "Keep this estimate" })).toBeNull();
  await waitFor(() => {
    expect(document.activeElement).toBe(said);
  });
});

test("an estimate that changed meanwhile is not kept: the page says so and shows the new one", async () => {
  let values = [4, 0, 7];
  const { api } = open(() => answer(valuesOf(values)));
  api
    .on(keepEstimate, () => {
      values = [4, 0, 7, 9];
      throw new Problem("changed-meanwhile", "Counts came in since you looked. Keep what you see.");
    })
    .install();
  renderApp("/surveys/s1/estimate");
  await userEvent.click(await screen.findByRole("button", { name: "Keep this estimate" }));
  expect((await screen.findByRole("alert")).textContent).toContain("Counts came in since you looked.");
  await screen.findByText("4 of 4", { exact: false });
});

test("the auditor reads the estimate and cannot keep it", async () => {
  const { api } = open(() => answer(valuesOf([4, 0, 7])), ["auditor"]);
  api.install();
  renderApp("/surveys/s1/estimate");
  await screen.findByRole("table", { name: "Estimates with their precision" });
  expect(screen.queryByRole("button", { name: "Keep this estimate" })).toBeNull();
});

test("without a count the page says what is missing, and where to enter it", async () => {
  const { api } = open(() => {
    throw new Problem("estimate-impossible", "None of the 5 picks has a count. Enter counts first.");
  });
  api.install();
  renderApp("/surveys/s1/estimate");
  await screen.findByText("None of the 5 picks has a count. Enter counts first.");
  expect(screen.getByRole("link", { name: "To the counts" }).getAttribute("href")).toBe("/surveys/s1/counts");
});

test("figures of a draw that was withdrawn meanwhile are not shown any more", async () => {
  let withdrawn = false;
  const { api } = open(() => {
    if (withdrawn) throw new Problem("draw-missing", "An estimate follows from a draw. Draw cells first.");
    return answer(valuesOf([4, 0, 7]));
  });
  api.install();
  const { queries } = renderApp("/surveys/s1/estimate");
  await screen.findByRole("table", { name: "Estimates with their precision" });
  withdrawn = true;
  await queries.invalidateQueries();
  await screen.findByText("An estimate follows from a draw. Draw cells first.");
  expect(screen.queryByRole("table", { name: "Estimates with their precision" })).toBeNull();
});
