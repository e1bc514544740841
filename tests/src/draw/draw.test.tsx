import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import {
  abandonDeclaration,
  declareDraw,
  listDraws,
  makeDraw,
  readDraw,
  readRecipe,
  withdrawDraw,
} from "#shared/api/draw.ts";
import { listFrames } from "#shared/api/frame.ts";
import { readSurvey } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import type { Role } from "#shared/access/table.ts";
import { FakeApi } from "../app/fake-api.ts";
import { sealed, session, survey } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";
import { declaration, type DrawList, drawList, liveDraw, summaryOf, withdrawnDraw } from "./draw-fixtures.ts";

vi.mock("../../../src/map/FrameSheetMap.tsx", () => ({
  FrameSheetMap: ({ label }: { label: string }) => <p>map: {label}</p>,
}));

afterEach(() => {
  vi.unstubAllGlobals();
});

/** The Draw stage over a list of draws that the test may change between two answers. */
function open(roles: Role[], list: DrawList) {
  const state = { list };
  const api = new FakeApi()
    .on(readSession, () => session())
    .on(readSurvey, () => survey(roles))
    .on(listFrames, () => ({ frames: [sealed()] }))
    .on(listDraws, () => state.list);
  return { api, state };
}

const address = "/surveys/s1/draw";
const live = liveDraw();
const liveList = drawList({
  declarations: [live.declaration],
  draws: [summaryOf(live)],
  liveDrawId: live.id,
});
const past = withdrawnDraw();

async function errorOf(label: string): Promise<string> {
  const field = await screen.findByLabelText(label);
  return document.getElementById(field.getAttribute("aria-describedby") ?? "")?.textContent ?? "";
}

test("a declaration without its number of picks is refused at the field, which gets the focus", async () => {
  const { api } = open(["planner"], drawList());
  api.install();
  renderApp(address);
  await userEvent.click(await screen.findByRole("button", { name: "Declare the draw" }));
  expect(await errorOf("Picks, n")).toBe("Say how many picks: at least 2 for a standard error.");
  expect(document.activeElement).toBe(screen.getByLabelText("Picks, n"));
  expect(api.named("declareDraw")).toEqual([]);
});

// The frame of the test has 25 cells: 20 picks and 10 reserves would need 30 different ones.
test("each field of a declaration says by itself what is wrong, and nothing is sent", async () => {
  const { api } = open(["planner"], drawList());
  api.install();
  renderApp(address);
  await userEvent.type(await screen.findByLabelText("Picks, n"), "2.5");
  expect(await errorOf("Picks, n")).toBe("“2.5” is no number of picks. Use a whole number, such as 60.");
  await userEvent.clear(screen.getByLabelText("Picks, n"));
  await userEvent.type(screen.getByLabelText("Picks, n"), "30");
  await userEvent.click(screen.getByRole("radio", { name: /without replacement/ }));
  expect(await errorOf("Picks, n")).toContain("the frame has 25");
  await userEvent.clear(screen.getByLabelText("Picks, n"));
  await userEvent.type(screen.getByLabelText("Picks, n"), "20");
  await userEvent.type(screen.getByLabelText(/^Reserves/), "10");
  expect(await errorOf("Reserves may stay empty")).toContain("need 30 different cells");
  expect(await errorOf("Picks, n")).not.toContain("need 30");
  await userEvent.clear(screen.getByLabelText(/^Reserves/));
  const level = screen.getByLabelText("Confidence level");
  await userEvent.clear(level);
  await userEvent.type(level, "100");
  expect(await errorOf("Confidence level")).toBe("No limits are 100 % sure. Give a level such as 0.95.");
  expect(level.closest("details")?.open).toBe(true);
  await userEvent.type(screen.getByLabelText("Note may stay empty"), "x");
  await userEvent.click(screen.getByRole("button", { name: "Declare the draw" }));
  expect(api.named("declareDraw")).toEqual([]);
});

// A fifth of 12 is 2.4, rounded up 3, at least 5; 95 % is kept as 0.95.
test("a declaration goes out with the usual reserves and opens the step of the seed", async () => {
  const { api, state } = open(["planner"], drawList());
  api
    .on(declareDraw, () => {
      state.list = drawList({ declarations: [declaration({ seedSource: "made-here" })] });
      return declaration({ seedSource: "made-here" });
    })
    .install();
  renderApp(address);
  await userEvent.type(await screen.findByLabelText("Picks, n"), "12");
  await userEvent.click(screen.getByRole("button", { name: "Declare the draw" }));
  await screen.findByRole("button", { name: "Make the seed and draw" });
  expect(api.named("declareDraw").map(({ body }) => body)).toEqual([
    {
      frameId: "f1",
      design: { kind: "srs-wr", n: 12 },
      generator: "sha256-counter",
      reserves: 5,
      limits: "log-normal",
      level: "0.95",
      seedSource: "made-here",
      note: "",
    },
  ]);
});

test("a declaration that the server refuses keeps what was typed", async () => {
  const { api } = open(["planner"], drawList());
  api
    .on(declareDraw, () => {
      throw new Problem("unreachable", "Check the network, then try again.");
    })
    .install();
  renderApp(address);
  await userEvent.type(await screen.findByLabelText("Picks, n"), "12");
  await userEvent.type(screen.getByLabelText("Note may stay empty"), "the pilot asked for 12");
  await userEvent.click(screen.getByRole("button", { name: "Declare the draw" }));
  expect((await screen.findByRole("alert")).textContent).toContain("Check the network");
  expect(screen.getByLabelText<HTMLInputElement>("Picks, n").value).toBe("12");
  expect(screen.getByLabelText<HTMLTextAreaElement>("Note may stay empty").value).toBe("the pilot asked for 12");
});

test("when somebody else declared meanwhile, the refusal stays in sight, and so does what was typed", async () => {
  const { api, state } = open(["planner"], drawList());
  api
    .on(declareDraw, () => {
      state.list = drawList({ declarations: [declaration({ declaredBy: "Tove Lind" })] });
      throw new Problem("declaration-open", "One was declared at noon. Draw from it, or abandon it with a reason.");
    })
    .on(abandonDeclaration, () => {
      state.list = drawList();
      return declaration({ state: "abandoned" });
    })
    .install();
  renderApp(address);
  await userEvent.type(await screen.findByLabelText("Picks, n"), "12");
  await userEvent.click(screen.getByRole("button", { name: "Declare the draw" }));
  await screen.findByText(/by Tove Lind/);
  expect(screen.getByRole("alert").textContent).toContain("One was declared at noon.");
  await userEvent.click(screen.getByRole("button", { name: "Abandon this declaration…" }));
  await userEvent.type(await screen.findByLabelText("Reason"), "made by mistake");
  await userEvent.click(screen.getByRole("button", { name: "Abandon the declaration" }));
  expect((await screen.findByLabelText<HTMLInputElement>("Picks, n")).value).toBe("12");
  expect(screen.queryByRole("alert")).toBeNull();
});

test("a third draw within a day says which draw it will be on this frame, and needs its reason", async () => {
  const second = liveDraw({ ...past, id: "w2", number: 2, declarationId: "d2" });
  const { api } = open(
    ["planner"],
    drawList({ draws: [summaryOf(second), summaryOf(past)], reasonNeeded: "third-draw-in-a-day" }),
  );
  api.on(declareDraw, () => declaration()).install();
  renderApp(address);
  await screen.findByText("Two seeds were given here within a day.");
  screen.getByText("This will be draw 3 on this frame. All draws stay on record.");
  await userEvent.type(screen.getByLabelText("Picks, n"), "12");
  await userEvent.click(screen.getByRole("button", { name: "Declare the draw" }));
  expect(await errorOf("Why there is a new draw")).toBe("Say why there is a new draw: it stands in the declaration.");
  expect(api.named("declareDraw")).toEqual([]);
  await userEvent.type(screen.getByLabelText("Why there is a new draw"), "the boundary was wrong");
  await userEvent.click(screen.getByRole("button", { name: "Declare the draw" }));
  await waitFor(() => {
    expect(api.named("declareDraw")[0]?.body).toMatchObject({ note: "the boundary was wrong" });
  });
});

test("a typed seed that cannot be seen in full is refused with the character named, and is kept", async () => {
  const { api } = open(["planner"], drawList({ declarations: [declaration()] }));
  api.install();
  renderApp(address);
  const seed = await screen.findByLabelText<HTMLInputElement>("Seed");
  await userEvent.type(seed, "12\u00a034");
  expect(await errorOf("Seed")).toBe(
    "Character 3 of the seed is a no-break space (U+00A0), which cannot be seen. Type the seed without it.",
  );
  await userEvent.click(screen.getByRole("button", { name: "Draw with this seed" }));
  expect(seed.value).toBe("12\u00a034");
  expect(api.named("makeDraw")).toEqual([]);
});

test("pressing Enter again while the seed is under way sends it once", async () => {
  const { api, state } = open(["planner"], drawList({ declarations: [declaration()] }));
  let answer: (() => void) | undefined;
  let sent = 0;
  api
    .on(makeDraw, () => {
      state.list = liveList;
      return live;
    })
    .on(readDraw, () => live)
    .install();
  const send = globalThis.fetch;
  vi.stubGlobal("fetch", async (path: string, init?: RequestInit) => {
    if (path.endsWith("/draw")) {
      sent += 1;
      await new Promise<void>((resolve) => (answer = resolve));
    }
    return send(path, init);
  });
  renderApp(address);
  const seed = await screen.findByLabelText("Seed");
  await userEvent.type(seed, "0039 1522{Enter}");
  await screen.findByText("Drawing…");
  await userEvent.type(seed, "{Enter}");
  expect(sent).toBe(1);
  answer?.();
  await screen.findByRole("heading", { name: "4 picks, 3 cells to visit" });
  expect(api.named("makeDraw").map(({ body }) => body)).toEqual([{ seed: "0039 1522" }]);
});

test("a seed that was used on the same frame is told while it is typed, with the way to its draw; it is not refused", async () => {
  const again = declaration({ id: "d2", design: { kind: "srs-wor", n: 6 } });
  const { api } = open(["planner"], drawList({ declarations: [again, past.declaration], draws: [summaryOf(past)] }));
  api.on(makeDraw, () => live).install();
  renderApp(address);
  const seed = await screen.findByLabelText("Seed");
  await userEvent.type(seed, "0039 152");
  expect(screen.queryByText("This will give the same cells.")).toBeNull();
  await userEvent.type(seed, "2 ");
  await screen.findByText("This will give the same cells.");
  screen.getByText(/used on this frame with this generator: draw 1\. The cells come in the same order, repeats aside/);
  await userEvent.click(screen.getByRole("button", { name: "See draw 1" }));
  const row = screen.getByRole("row", { name: /^Draw 1/ });
  expect(document.activeElement).toBe(row);
  expect(row.textContent).toContain('"0039 1522"');
  await userEvent.click(screen.getByRole("button", { name: "Draw with this seed" }));
  await waitFor(() => {
    expect(api.named("makeDraw")).toHaveLength(1);
  });
});

test("a draw that was broken off goes on with the seed on record, which nobody types again", async () => {
  const begun = declaration({ seed: { text: "7 7 7", at: "2031-06-03T08:15:00Z", by: "Ines Marrow" } });
  const { api } = open(["planner"], drawList({ declarations: [begun] }));
  api.on(makeDraw, () => live).install();
  renderApp(address);
  await userEvent.click(await screen.findByRole("button", { name: "Draw with the seed on record" }));
  expect(screen.queryByLabelText("Seed")).toBeNull();
  screen.getByText('"7 7 7"');
  await waitFor(() => {
    expect(api.named("makeDraw").map(({ body }) => body)).toEqual([{}]);
  });
});

test("the live draw shows repeats on both sides, closed picks and opened reserves, and reserves that wait apart", async () => {
  const { api } = open(["auditor"], liveList);
  api.on(readDraw, () => live).install();
  renderApp(address);
  await screen.findByRole("heading", { name: "4 picks, 3 cells to visit" });
  screen.getByText("1 cell was picked more than once: visited once, entered in the estimate each time.");
  const row = (start: string) =>
    within(screen.getByRole("grid")).getByRole("row", { name: new RegExp(`^${start}\\b`) });
  expect(row("1").textContent).toContain("×2 again at 3");
  expect(row("3").textContent).toContain("×2 of pick 1");
  expect(row("4").textContent).toContain("unsafeclosed");
  expect(row("5").textContent).toContain("reserve, opened for pick 4");
  await userEvent.click(screen.getByRole("tab", { name: "Reserves 1" }));
  expect(row("6").textContent).toContain("would repeat pick 2waits, in order");
  expect(screen.queryByRole("button", { name: "Withdraw…" })).toBeNull();
});

// 2 June 2031, 22:10 UTC is ten past midnight of 3 June in Paris, where the survey of the test is.
test("times are told on the survey's own clock", async () => {
  const { api } = open(["planner"], drawList({ declarations: [declaration()] }));
  api.install();
  renderApp(address);
  await screen.findByText("3 June 2031, 00:10 CEST by Ines Marrow");
});

test("withdrawing needs a reason and keeps it when it is refused", async () => {
  const { api, state } = open(["planner"], liveList);
  let refused = true;
  api
    .on(readDraw, () => live)
    .on(withdrawDraw, () => {
      if (refused) throw new Problem("unreachable", "Check the network, then try again.");
      state.list = drawList({ declarations: [past.declaration], draws: [summaryOf(past)] });
      return past;
    })
    .install();
  renderApp(address);
  await userEvent.click(await screen.findByRole("button", { name: "Withdraw…" }));
  const dialog = await screen.findByRole("dialog", { name: "Withdraw draw 1?" });
  await userEvent.click(within(dialog).getByRole("button", { name: "Withdraw the draw" }));
  await within(dialog).findByText("Say why: it stands in the record.");
  expect(api.named("withdrawDraw")).toEqual([]);
  await userEvent.type(within(dialog).getByLabelText("Reason"), "wrong season");
  await userEvent.click(within(dialog).getByRole("button", { name: "Withdraw the draw" }));
  expect((await within(dialog).findByRole("alert")).textContent).toContain("Check the network");
  expect(within(dialog).getByLabelText<HTMLTextAreaElement>("Reason").value).toBe("wrong season");
  refused = false;
  await userEvent.click(within(dialog).getByRole("button", { name: "Withdraw the draw" }));
  await screen.findByText(/^Withdrawn 4 June 2031, 09:00 CEST by Ines Marrow: “wrong season”/);
  expect(api.named("withdrawDraw").at(-1)?.body).toEqual({ reason: "wrong season" });
});

test("the picks of a withdrawn draw can still be read", async () => {
  const { api } = open(["auditor"], drawList({ declarations: [past.declaration], draws: [summaryOf(past)] }));
  api.on(readDraw, () => past).install();
  renderApp(address);
  await userEvent.click(await screen.findByRole("button", { name: "Show those of draw 1" }));
  const dialog = await screen.findByRole("dialog", { name: "Picks of draw 1" });
  expect(await within(dialog).findAllByRole("row")).toHaveLength(7);
  await userEvent.click(within(dialog).getByRole("button", { name: "Close" }));
  expect(screen.queryByRole("dialog")).toBeNull();
});

test("the recipe is fetched when it is asked for, in Python and for a shell", async () => {
  const { api } = open(["auditor"], liveList);
  api
    .on(readDraw, () => live)
    .on(readRecipe, () => ({ shell: "printf one | sha256sum", python: "import hashlib" }))
    .install();
  renderApp(address);
  const ask = await screen.findByRole("button", { name: "Repeat it yourself" });
  expect(api.named("readRecipe")).toEqual([]);
  await userEvent.click(ask);
  const dialog = await screen.findByRole("dialog", { name: "Repeat this draw yourself" });
  await within(dialog).findByText("import hashlib");
  await userEvent.click(within(dialog).getByRole("tab", { name: "Shell" }));
  await within(dialog).findByText("printf one | sha256sum");
  await userEvent.click(within(dialog).getByRole("button", { name: "Close" }));
  await waitFor(() => {
    expect(document.activeElement).toBe(ask);
  });
});
