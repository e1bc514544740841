import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import { assignVisits, closePick, exportWaypoints, listVisits } from "#shared/api/field.ts";
import { listPeople } from "#shared/api/people.ts";
import { readSurvey } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import type { Role } from "#shared/access/table.ts";
import { FakeApi } from "../app/fake-api.ts";
import { session, survey } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";
import { counted, people, reported, visit, type VisitList, visitList } from "./field-fixtures.ts";

vi.mock("../../../src/map/FrameSheetMap.tsx", () => ({
  FrameSheetMap: ({ label }: { label: string }) => <p>map: {label}</p>,
}));

afterEach(() => {
  vi.unstubAllGlobals();
});

/** The Field stage over a list of cells that the test may change between two answers. */
function open(roles: Role[], list: VisitList) {
  const state = { list };
  const api = new FakeApi()
    .on(readSession, () => session())
    .on(readSurvey, () => survey(roles))
    .on(listPeople, () => ({ members: people, invitations: [] }))
    .on(listVisits, () => state.list);
  return { api, state };
}

const address = "/surveys/s1/field";
const tove = { memberId: "m2", name: "Tove Lind", day: "Tuesday" };

async function rowOf(label: string) {
  return within(await screen.findByRole("grid", { name: "Cells to visit" })).getByRole("row", {
    name: new RegExp(`\\b${label}\\b`),
  });
}

function labelsShown(): string[] {
  const rows = within(screen.getByRole("grid", { name: "Cells to visit" })).getAllByRole("row");
  return rows.slice(1).map((row) => row.querySelector("b")?.textContent ?? "");
}

test("the lead gives several cells to a counter for a day in one act, and the selection is over", async () => {
  const { api, state } = open(["lead"], visitList([visit(1), visit(2), visit(3)]));
  api
    .on(assignVisits, ({ body }) => {
      state.list = visitList([visit(1, { assignedTo: tove }), visit(2), visit(3, { assignedTo: tove })]);
      return { assigned: body.visitIds.length };
    })
    .install();
  renderApp(address);
  await screen.findByText("Select cells in the list, then say who goes.");
  expect(screen.getByRole("button", { name: "Share out" }).hasAttribute("disabled")).toBe(true);
  await userEvent.click(screen.getByRole("checkbox", { name: "Select A1" }));
  await userEvent.click(screen.getByRole("checkbox", { name: "Select A3" }));
  screen.getByText("2 cells selected.");
  const give = screen.getByLabelText("Give to");
  await within(give).findByRole("option", { name: "Tove Lind (counter)" });
  expect(within(give).queryByRole("option", { name: /Ada Quill/ })).toBeNull();
  await userEvent.selectOptions(give, "Tove Lind (counter)");
  await userEvent.type(screen.getByLabelText("Day may stay empty"), "Tuesday");
  await userEvent.click(screen.getByRole("button", { name: "Share out" }));
  await screen.findByText("Select cells in the list, then say who goes.");
  expect(api.named("assignVisits").map(({ body }) => body)).toEqual([
    { visitIds: ["v1", "v3"], memberId: "m2", day: "Tuesday", seen: [] },
  ]);
  expect((await rowOf("A1")).textContent).toContain("Tove Lind, Tuesday");
  expect((await rowOf("A2")).textContent).toContain("nobody yet");
});

test("cells that cannot be shared out are told, and person, day and selection stay", async () => {
  const { api } = open(["lead"], visitList([visit(1), visit(2)]));
  api
    .on(assignVisits, () => {
      throw new Problem("unreachable", "Check the network, then try again.");
    })
    .install();
  renderApp(address);
  await userEvent.click(await screen.findByRole("button", { name: "Select all 2 shown" }));
  await screen.findByRole("option", { name: "Tove Lind (counter)" });
  await userEvent.selectOptions(screen.getByLabelText("Give to"), "m2");
  await userEvent.type(screen.getByLabelText("Day may stay empty"), "Tuesday");
  await userEvent.click(screen.getByRole("button", { name: "Share out" }));
  expect((await screen.findByRole("alert")).textContent).toContain("Check the network");
  screen.getByText("2 cells selected.");
  expect(screen.getByLabelText<HTMLInputElement>("Day may stay empty").value).toBe("Tuesday");
});

/** Two leads: while one chooses A1 and A2, the other has given A1 to Tove for Tuesday. */
async function shareOutLate() {
  const { api, state } = open(["lead"], visitList([visit(1), visit(2)]));
  api
    .on(assignVisits, ({ body }) => {
      if (body.seen.length > 0 || !body.visitIds.includes("v1")) return { assigned: body.visitIds.length };
      state.list = visitList([visit(1, { assignedTo: tove }), visit(2)]);
      const current = [{ visitId: "v1", label: "A1", assignedTo: tove }];
      throw new Problem("changed-meanwhile", "Look who has it now.", { kind: "versions", current });
    })
    .install();
  renderApp(address);
  await userEvent.click(await screen.findByRole("button", { name: "Select all 2 shown" }));
  await screen.findByRole("option", { name: /^Ines Marrow/ });
  await userEvent.selectOptions(screen.getByLabelText("Give to"), screen.getByRole("option", { name: /^Ines Marrow/ }));
  await userEvent.click(screen.getByRole("button", { name: "Share out" }));
  await screen.findByText("1 cell was shared out by somebody else meanwhile.");
  screen.getByText("A1: Tove Lind, Tuesday");
  return api;
}

test("cells that another lead shared out meanwhile are named, and given anyway only when that is said", async () => {
  const api = await shareOutLate();
  await userEvent.click(screen.getByRole("button", { name: "Give it to Ines Marrow anyway" }));
  await screen.findByText("Select cells in the list, then say who goes.");
  expect(api.named("assignVisits").map(({ body }) => body)).toMatchObject([
    { visitIds: ["v1", "v2"], seen: [] },
    { visitIds: ["v1", "v2"], seen: [{ visitId: "v1", memberId: "m2", day: "Tuesday" }] },
  ]);
});

test("they can be left as they are, and the other cells stay selected", async () => {
  const api = await shareOutLate();
  await userEvent.click(screen.getByRole("button", { name: "Leave it as it is" }));
  screen.getByText("1 cell selected.");
  expect(screen.queryByText(/shared out by somebody else/)).toBeNull();
  await userEvent.click(screen.getByRole("button", { name: "Share out" }));
  await screen.findByText("Select cells in the list, then say who goes.");
  expect(api.named("assignVisits")[1]?.body).toMatchObject({ visitIds: ["v2"], seen: [] });
});

test("filters show whose cells and in which state; a selected cell that is hidden is told", async () => {
  const { api } = open(
    ["lead"],
    visitList([
      visit(1, { assignedTo: tove }),
      visit(2, { count: counted(4) }),
      visit(3, { count: reported("unsafe"), assignedTo: tove }),
      visit(4, { state: "closed", count: reported("refused") }),
    ]),
  );
  api.install();
  renderApp(address);
  await screen.findByRole("heading", { level: 1, name: "2 of 4 cells settled" });
  await userEvent.click(screen.getByRole("checkbox", { name: "Select A2" }));
  const state = screen.getByLabelText("In which state");
  const who = screen.getByLabelText("Whose cells");
  await userEvent.selectOptions(state, "open");
  expect(labelsShown()).toEqual(["A1"]);
  screen.getByText("1 cell selected, 1 of them hidden by the filter.");
  await userEvent.selectOptions(state, "settled");
  expect(labelsShown()).toEqual(["A2", "A4"]);
  await userEvent.selectOptions(state, "reported");
  expect(labelsShown()).toEqual(["A3"]);
  await userEvent.selectOptions(state, "");
  await userEvent.selectOptions(who, "Tove Lind");
  expect(labelsShown()).toEqual(["A1", "A3"]);
  await userEvent.selectOptions(who, "nobody");
  expect(labelsShown()).toEqual(["A2", "A4"]);
  // A closed cell is nobody's errand any more: "all" leaves it out.
  await userEvent.click(screen.getByRole("button", { name: "Select all 1 shown" }));
  screen.getByText("1 cell selected.");
});

test("closing a reported cell takes its state over, needs a reason and tells the reserve that opened", async () => {
  const { api, state } = open(["lead"], visitList([visit(1), visit(2, { count: reported("unsafe") })]));
  api
    .on(closePick, () => {
      state.list = visitList([
        visit(1),
        visit(2, { state: "closed", count: reported("unsafe") }),
        visit(7, { orders: [3], openedFor: 2 }),
      ]);
      return {
        closed: [2],
        opened: [{ position: 3, label: "A7", repeatsCountedCell: false }],
        passedOver: [],
        reservesLeft: 2,
        unreplaced: 0,
      };
    })
    .install();
  renderApp(address);
  await screen.findByText("1 cell was reported as not countable.");
  await userEvent.click(await rowOf("A2"));
  await userEvent.click(screen.getByRole("button", { name: "Close A2…" }));
  const dialog = await screen.findByRole("dialog", { name: "Close cell A2?" });
  within(dialog).getByText("The next reserve in draw order opens in its place.");
  expect(within(dialog).getByRole<HTMLInputElement>("radio", { name: /^unsafe/i }).checked).toBe(true);
  await userEvent.click(within(dialog).getByRole("button", { name: "Close the pick" }));
  within(dialog).getByText("Say why: it stands in the record.");
  expect(api.named("closePick")).toEqual([]);
  await userEvent.type(within(dialog).getByLabelText("Reason"), "undercut bank");
  await userEvent.click(within(dialog).getByRole("button", { name: "Close the pick" }));
  await within(dialog).findByText("Opened in draw order: A7 (pick 3). 2 reserves left.");
  expect(api.named("closePick")[0]).toMatchObject({
    params: { visitId: "v2" },
    body: { state: "unsafe", reason: "undercut bank" },
  });
  await userEvent.click(within(dialog).getByRole("button", { name: "Back to the list" }));
  expect((await rowOf("A7")).textContent).toContain("reserve, opened for pick 2");
});

test("a refused closing keeps state and reason, and is sent again under the same id", async () => {
  const { api } = open(["lead"], visitList([visit(1)], { reservesLeft: 0 }));
  api
    .on(closePick, () => {
      throw new Problem("unreachable", "Check the network, then try again.");
    })
    .install();
  renderApp(address);
  await userEvent.click(await rowOf("A1"));
  await userEvent.click(screen.getByRole("button", { name: "Close A1…" }));
  const dialog = await screen.findByRole("dialog");
  within(dialog).getByText(/No reserve is left: the list goes on from the same seed/);
  await userEvent.click(within(dialog).getByRole("radio", { name: /^not reached/i }));
  await userEvent.type(within(dialog).getByLabelText("Reason"), "flooded");
  const send = within(dialog).getByRole("button", { name: "Close the pick" });
  await userEvent.click(send);
  await within(dialog).findByRole("alert");
  expect(within(dialog).getByLabelText<HTMLTextAreaElement>("Reason").value).toBe("flooded");
  await userEvent.click(send);
  await waitFor(() => {
    expect(api.named("closePick")).toHaveLength(2);
  });
  const [first, second] = api.named("closePick").map(({ body }) => body);
  expect(second).toEqual(first);
});

test("a counted cell says why it is not closed", async () => {
  const { api } = open(["lead"], visitList([visit(1, { count: counted(0) })]));
  api.install();
  renderApp(address);
  await userEvent.click(await rowOf("A1"));
  screen.getByText("The cell has its count: it is not closed, only amended.");
  screen.getByText("51.000456, 2.000123");
  expect(screen.queryByRole("button", { name: /^Close A1/ })).toBeNull();
});

// "FENFEN" leaves nothing of a label within six characters: every name would be FENFEN. "FENF" and "FENFE" leave one or two.
test("names that a GPS unit could not tell apart are shown with what to change, and nothing can be saved", async () => {
  const { api } = open(["lead"], visitList([visit(1), visit(2)]));
  api.on(exportWaypoints, () => "<gpx/>").install();
  renderApp(address);
  const gpx = await screen.findByRole("button", { name: "Save as GPX" });
  screen.getByText("A1 A2");
  await userEvent.click(screen.getByRole("radio", { name: "6" }));
  await userEvent.type(screen.getByLabelText("Prefix may stay empty"), "fenfen");
  await screen.findByText("1 name would stand for several cells.");
  screen.getByText("FENFEN: A1 and A2. Use a prefix of at most 4 characters.");
  screen.getByText('The prefix is written "FENFEN": names hold upper-case letters and digits only.');
  expect(gpx.hasAttribute("disabled")).toBe(true);
  await userEvent.type(screen.getByLabelText("Prefix may stay empty"), "{Backspace}{Backspace}");
  await screen.findByText("FENFA1 FENFA2");
  expect(gpx.hasAttribute("disabled")).toBe(false);
});

test("a counter sees their own cells only, with waypoints and the way to the counts, and shares out nothing", async () => {
  const { api } = open(["counter"], visitList([visit(4, { assignedTo: tove })]));
  api.install();
  renderApp(address);
  await screen.findByRole("heading", { level: 1, name: "0 of your 1 cell settled" });
  expect(screen.queryByRole("button", { name: "Share out" })).toBeNull();
  expect(screen.queryByRole("checkbox")).toBeNull();
  expect(screen.queryByLabelText("Cells of")).toBeNull();
  expect(screen.queryByText("Reserves left")).toBeNull();
  expect(api.named("listPeople")).toEqual([]);
  await userEvent.click(await rowOf("A4"));
  expect(screen.queryByRole("button", { name: /^Close/ })).toBeNull();
  screen.getByRole("button", { name: "Save as GPX" });
  expect(screen.getByRole("link", { name: "Enter counts" }).getAttribute("href")).toBe("/surveys/s1/counts");
});

test("a counter without cells is told who gives them", async () => {
  const { api } = open(["counter"], visitList([]));
  api.install();
  renderApp(address);
  await screen.findByRole("heading", { name: "No cells are yours yet" });
});

test("an auditor reads the list and has nothing to press but the way to the counts", async () => {
  const { api } = open(["auditor"], visitList([visit(1)]));
  api.install();
  renderApp(address);
  await screen.findByRole("link", { name: "To the counts" });
  expect(screen.queryByRole("link", { name: "Enter counts" })).toBeNull();
  expect(screen.queryByRole("button", { name: /Save as|Share out/ })).toBeNull();
});
