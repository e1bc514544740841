import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import { listAreas, makePlane, readPlane, searchCrs } from "#shared/api/area.ts";
import { listFrames, saveDraftFrame, sealFrame, type FrameVersion } from "#shared/api/frame.ts";
import { readSurvey } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import type { Role } from "#shared/access/table.ts";
import { FakeApi } from "../app/fake-api.ts";
import { area, draft, plane, sealed, session, spec, survey } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

// The worker's own work, done in the page: jsdom has no workers.
vi.mock("../../../src/workers/frame-preview.ts", async () => {
  const { FramePreviewWork } = await import("../../../src/workers/frame-preview-work.ts");
  const work = new FramePreviewWork();
  return {
    loadPlane: (...input: Parameters<typeof work.loadPlane>) => work.loadPlane(...input),
    previewCells: (...input: Parameters<typeof work.preview>) => work.preview(...input),
    loadSealedCells: () => Promise.reject(new Problem("unreachable", "No cells in this test.")),
  };
});
vi.mock("../../../src/features/frame/FrameSheet.tsx", () => ({
  FrameSheet: ({ cells }: { cells: { units: number } | null }) => <p>sheet of {cells?.units ?? "no"} cells</p>,
}));

afterEach(() => {
  vi.unstubAllGlobals();
});

let id = 0;

/** A survey of its own for each test: the worker keeps planes by survey and area. */
function open(roles: Role[], frames: FrameVersion[]) {
  id += 1;
  const surveyId = `s${id}`;
  const api = new FakeApi()
    .on(readSession, () => session())
    .on(readSurvey, () => survey(roles, { id: surveyId }))
    .on(listAreas, () => ({ areas: [area()] }))
    .on(listFrames, () => ({ frames }))
    .on(makePlane, () => plane)
    .on(readPlane, () => plane)
    .on(saveDraftFrame, ({ body }) => {
      const kept = draft({ spec: body.spec, draftSha256: "77".repeat(32) });
      frames.splice(0, frames[0]?.sealed === null ? 1 : 0, kept);
      return kept;
    });
  return { api, address: `/surveys/${surveyId}/frame` };
}

async function sealButton(name: string) {
  return screen.findByRole("button", { name });
}

// 100 m in cells of 20 m is 5 × 5 under every rule; of 30 m it is 4 × 4, 3 × 3 and 3 × 3 (centres at 15, 45, 75 m).
test("each rule tells its number of cells while the size changes", async () => {
  const { api, address } = open(["planner"], []);
  api.install();
  renderApp(address);
  await sealButton("Seal the frame: 25 cells");
  const side = screen.getByLabelText("Square, side");
  await userEvent.clear(side);
  await userEvent.type(side, "30 m");
  await sealButton("Seal the frame: 16 cells");
  expect(screen.getByRole("radio", { name: /^Clip/ }).closest("label")?.textContent).toContain("16cells");
  expect(screen.getByRole("radio", { name: /^Centre/ }).closest("label")?.textContent).toContain("9cells");
  await userEvent.click(screen.getByRole("radio", { name: /^Inside/ }));
  await sealButton("Seal the frame: 9 cells");
  screen.getByText(/nothing will be said of them/);
});

test("a size that cannot be read is told at its field, and nothing can be sealed", async () => {
  const { api, address } = open(["planner"], []);
  api.install();
  renderApp(address);
  await sealButton("Seal the frame: 25 cells");
  const side = screen.getByLabelText("Square, side");
  await userEvent.clear(side);
  await userEvent.type(side, "1,500");
  await screen.findByText("“1,500” can be read in two ways. Write 1500 or 1.500.");
  expect((await sealButton("Seal the frame")).hasAttribute("disabled")).toBe(true);
  screen.getByText("What would be sealed is not settled yet: see above.");
});

// 10 000 m² in cells of 0.02 m is 25 000 000 cells; 0.02·√2.5 = 0.0316, so 0.032 m.
test("too many cells are told with a side that fits", async () => {
  const { api, address } = open(["planner"], []);
  api.install();
  renderApp(address);
  await sealButton("Seal the frame: 25 cells");
  const side = screen.getByLabelText("Square, side");
  await userEvent.clear(side);
  await userEvent.type(side, "0.02");
  await screen.findByText("This makes 25 000 000 cells; a frame holds 10 000 000. Use 0.032 m or more.");
  expect((await sealButton("Seal the frame")).hasAttribute("disabled")).toBe(true);
});

test("what the planner sets is kept a moment later; opening the page alone keeps nothing", async () => {
  const { api, address } = open(["planner"], []);
  api.install();
  renderApp(address);
  await sealButton("Seal the frame: 25 cells");
  expect(api.named("saveDraftFrame")).toEqual([]);
  await userEvent.click(screen.getByRole("radio", { name: /^Centre/ }));
  await waitFor(() => {
    expect(api.named("saveDraftFrame")).toHaveLength(1);
  });
  expect(api.named("saveDraftFrame")[0]?.body).toEqual({
    spec: { ...spec, membership: { rule: "centre" }, countIn: "whole" },
    seen: null,
  });
});

test("sealing keeps the draft as it is on the page and seals exactly that", async () => {
  const frames: FrameVersion[] = [];
  const { api, address } = open(["planner"], frames);
  api
    .on(sealFrame, () => {
      const made = sealed();
      frames.splice(0, 1, made);
      return made;
    })
    .install();
  renderApp(address);
  await userEvent.click(await sealButton("Seal the frame: 25 cells"));
  await screen.findByText("version 1, sealed");
  expect(api.named("sealFrame")[0]?.body).toEqual({ draftSha256: "77".repeat(32), cells: 25 });
  screen.getByText("56565656…565656");
});

test("a frame that changed meanwhile is not sealed, and the page says what to do", async () => {
  const { api, address } = open(["planner"], []);
  api
    .on(sealFrame, () => {
      throw new Problem("frame-changed", "Reload, check the 24 cells again, and seal what you see.");
    })
    .install();
  renderApp(address);
  await userEvent.click(await sealButton("Seal the frame: 25 cells"));
  expect((await screen.findByRole("alert")).textContent).toContain("check the 24 cells again");
});

test("any projected system can be found by its code, and the area is laid on its plane", async () => {
  const { api, address } = open(["planner"], []);
  api.on(searchCrs, () => ({ systems: [{ epsg: 3035, name: "ETRS89 / LAEA Europe", note: "" }] })).install();
  renderApp(address);
  await sealButton("Seal the frame: 25 cells");
  await userEvent.selectOptions(screen.getByLabelText("Projected CRS"), "another");
  await userEvent.type(await screen.findByLabelText("EPSG code or name"), "EPSG:3035");
  await userEvent.click(await screen.findByRole("button", { name: /LAEA Europe/ }));
  await waitFor(() => {
    expect(api.named("makePlane").map((call) => call.body)).toEqual([{ epsg: 25831 }, { epsg: 3035 }]);
  });
  expect(api.named("searchCrs").at(-1)?.query).toEqual({ text: "3035", projected: "yes" });
});

test("a system that cannot be used is refused at its field", async () => {
  const { api, address } = open(["planner"], []);
  api
    .on(makePlane, () => {
      throw new Problem(
        "crs-unsupported",
        "OSGB36 needs a grid file that is not here. Choose the UTM zone of the place.",
      );
    })
    .install();
  renderApp(address);
  await screen.findAllByText(/OSGB36 needs a grid file that is not here/);
});

test("the lead reads the sealed frame and has nothing to press", async () => {
  const { api, address } = open(["lead"], [sealed()]);
  api.install();
  renderApp(address);
  await screen.findByText("version 1, sealed");
  expect(screen.queryByRole("button", { name: /new version/ })).toBeNull();
  expect(screen.queryByRole("link", { name: /Draw from/ })).toBeNull();
  expect(screen.getByRole("link", { name: "Frame statement (JSON)" }).getAttribute("href")).toMatch(
    /\/frames\/f1\/statement$/,
  );
  await waitFor(() => {
    expect(api.named("readPlane")).toHaveLength(1);
  });
  expect(api.named("makePlane")).toEqual([]);
});

test("while nothing is sealed the auditor is told so", async () => {
  const { api, address } = open(["auditor"], [draft()]);
  api.install();
  renderApp(address);
  await screen.findByRole("heading", { name: "The frame is not sealed yet." });
});

test("a new version starts from the sealed one and is kept as a draft", async () => {
  const { api, address } = open(["planner"], [sealed()]);
  api.install();
  renderApp(address);
  await userEvent.click(await screen.findByRole("button", { name: /Make a new version/ }));
  await screen.findByText("version 2, not sealed");
  await waitFor(() => {
    expect(api.named("saveDraftFrame")).toHaveLength(1);
  });
  expect(api.named("saveDraftFrame")[0]?.body).toEqual({ spec, seen: null });
  await userEvent.selectOptions(await screen.findByLabelText("Version"), "f1");
});

// The other planner's draft has cells of 50 m (100 m in cells of 50 m is 2 × 2) and counts whole cells by their centres.
const theirs = {
  ...spec,
  cells: { ...spec.cells, widthMm: 50_000, heightMm: 50_000 },
  membership: { rule: "centre" as const },
  countIn: "whole" as const,
};

/** A server that keeps drafts as the real one does. */
function changedMeanwhile(frames: FrameVersion[], now: { spec: typeof theirs; draftSha256: string } | null) {
  const { api, address } = open(["planner"], frames);
  api.on(saveDraftFrame, ({ body }) => {
    if (body.seen === (now?.draftSha256 ?? null)) return draft({ spec: body.spec, draftSha256: "77".repeat(32) });
    throw new Problem("changed-meanwhile", "Look at both versions.", { kind: "versions", current: now });
  });
  return { api, address };
}

test("a draft that another planner changed meanwhile is shown beside one's own, and what is chosen is kept over it", async () => {
  const draftSha256 = "99".repeat(32);
  const { api, address } = changedMeanwhile([draft()], { spec: theirs, draftSha256 });
  api.install();
  renderApp(address);
  await sealButton("Seal the frame: 25 cells");
  await userEvent.click(screen.getByRole("radio", { name: /^Inside/ }));
  await screen.findByRole("heading", { name: "Both versions" });
  expect(screen.queryByRole("button", { name: /^Seal the frame/ })).toBeNull();
  const choices = within(screen.getByRole("region", { name: "Both versions" }));
  // Only the other planner changed the side; both changed the edge rule.
  const side = within(choices.getByRole("group", { name: "Square, side" }));
  expect(side.getByRole("radio", { name: /^Take theirs/, checked: true })).toBeDefined();
  await userEvent.click(
    within(choices.getByRole("group", { name: "Edge rule" })).getByRole("radio", { name: /^Keep mine/ }),
  );
  await userEvent.click(choices.getByRole("button", { name: "Go on with what is chosen" }));
  await sealButton("Seal the frame: 4 cells");
  await waitFor(() => {
    expect(api.named("saveDraftFrame")).toHaveLength(2);
  });
  expect(api.named("saveDraftFrame").map(({ body }) => body)).toEqual([
    { spec: { ...spec, membership: { rule: "inside" }, countIn: "whole" }, seen: "12".repeat(32) },
    { spec: { ...theirs, membership: { rule: "inside" } }, seen: draftSha256 },
  ]);
});

test("a draft that was sealed meanwhile is told, and what is set here may begin the next version", async () => {
  const { api, address } = changedMeanwhile([draft()], null);
  api.install();
  renderApp(address);
  await sealButton("Seal the frame: 25 cells");
  await userEvent.click(screen.getByRole("radio", { name: /^Inside/ }));
  await screen.findByText("Version 1 was sealed by somebody else meanwhile.");
  screen.getByRole("button", { name: "Look at the sealed frame" });
  await userEvent.click(screen.getByRole("button", { name: "Begin the next version with what is set here" }));
  await waitFor(() => {
    expect(api.named("saveDraftFrame")).toHaveLength(2);
  });
  expect(api.named("saveDraftFrame")[1]?.body).toMatchObject({ seen: null, spec: { membership: { rule: "inside" } } });
});
