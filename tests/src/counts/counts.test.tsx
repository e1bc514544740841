import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { amendCount, enterCounts, listEntries } from "#shared/api/counts.ts";
import { Problem } from "#shared/problem.ts";
import { renderApp } from "../app/render-app.tsx";
import { reported, visit } from "../field/field-fixtures.ts";
import { address, gridOf, inForce, keeping, open, rowOf } from "./counts-fixtures.ts";

afterEach(() => {
  vi.unstubAllGlobals();
});

const formOf = (label: string) => screen.findByRole("form", { name: `Count of ${label}` });

test("a number is saved for its cell, the button says what it saves, and the next open cell waits for its number", async () => {
  const { api, state } = open(["lead"], [visit(1), visit(2, { count: inForce(3) }), visit(3)]);
  api.on(enterCounts, keeping(state)).install();
  renderApp(address);
  await screen.findByRole("heading", { name: "1 of 3 cells written down" });
  await userEvent.click(await rowOf("A1"));
  const form = within(await formOf("A1"));
  await userEvent.type(form.getByLabelText("Count"), "7");
  await userEvent.type(form.getByLabelText(/^Note/), "by the ditch");
  await userEvent.click(form.getByRole("button", { name: "Save: 7 spikes" }));
  const next = within(await formOf("A3"));
  expect(document.activeElement).toBe(next.getByLabelText("Count"));
  expect(api.named("enterCounts")[0]?.body).toMatchObject({
    entries: [{ visitId: "v1", targetId: "t1", said: { state: "counted", value: 7 }, note: "by the ditch" }],
  });
  await screen.findByRole("heading", { name: "2 of 3 cells written down" });
});

test("zero is an act of its own; an empty form saves nothing", async () => {
  const { api, state } = open(["counter"], [visit(1), visit(2)]);
  api.on(enterCounts, keeping(state)).install();
  renderApp(address);
  await userEvent.click(await rowOf("A1"));
  const form = within(await formOf("A1"));
  await userEvent.click(form.getByRole("button", { name: "Save" }));
  form.getByText("Type the number, press Zero, or say why there is none.");
  expect(document.activeElement).toBe(form.getByLabelText("Count"));
  expect(api.named("enterCounts")).toEqual([]);
  await userEvent.click(form.getByRole("button", { name: "Zero: searched, none found" }));
  await formOf("A2");
  expect(api.named("enterCounts")[0]?.body).toMatchObject({ entries: [{ said: { state: "counted", value: 0 } }] });
  await waitFor(async () => {
    expect((await rowOf("A1")).textContent).toContain("zero");
  });
  expect((await rowOf("A2")).textContent).toContain("not visited yetno count");
});

test("a word that may be a zero is asked, and saved as zero after a yes", async () => {
  const { api, state } = open(["lead"], [visit(1)]);
  api.on(enterCounts, keeping(state)).install();
  renderApp(address);
  await userEvent.click(await rowOf("A1"));
  const form = within(await formOf("A1"));
  await userEvent.type(form.getByLabelText("Count"), "nil");
  form.getByText("Is “nil” a zero: searched, none found?");
  await userEvent.click(form.getByRole("button", { name: "Yes: 0 spikes" }));
  await screen.findByRole("heading", { name: "1 of 1 cell written down" });
  expect(api.named("enterCounts")[0]?.body).toMatchObject({ entries: [{ said: { state: "counted", value: 0 } }] });
});

test.each([
  [">50", "A bound is no count. Enter the number, or count again."],
  ["2.5", "2.5 is no whole number, and spikes are counted whole."],
])("%s is told at its field and not sent", async (text, why) => {
  const { api } = open(["lead"], [visit(1)]);
  api.install();
  renderApp(address);
  await userEvent.click(await rowOf("A1"));
  const form = within(await formOf("A1"));
  await userEvent.type(form.getByLabelText("Count"), `${text}{Enter}`);
  form.getByText(why);
  expect(api.named("enterCounts")).toEqual([]);
});

test("a reason takes the place of the number, and says what follows from it", async () => {
  const { api, state } = open(["lead"], [visit(1)]);
  api.on(enterCounts, keeping(state)).install();
  renderApp(address);
  await userEvent.click(await rowOf("A1"));
  const form = within(await formOf("A1"));
  const reason = form.getByLabelText("Or no count, because");
  await userEvent.selectOptions(reason, "unsafe");
  expect(form.getByLabelText("Count").hasAttribute("disabled")).toBe(true);
  form.getByText("A lead closes the pick afterwards, and the next reserve opens.");
  await userEvent.selectOptions(reason, "not in the population");
  form.getByText(/Enters the estimate as 0, and its number is told/);
  await userEvent.click(form.getByRole("button", { name: "Save: not in the population" }));
  await screen.findByRole("heading", { name: "1 of 1 cell written down" });
  expect(api.named("enterCounts")[0]?.body).toMatchObject({ entries: [{ said: { state: "not-in-population" } }] });
});

test("an entry that did not get through keeps what was typed, and is sent again as the same one", async () => {
  const { api, state } = open(["lead"], [visit(1), visit(2)]);
  const keep = keeping(state);
  let lost = true;
  api
    .on(enterCounts, (input) => {
      if (!lost) return keep(input);
      throw new Problem("unreachable", "Check the network; nothing was lost here.");
    })
    .install();
  renderApp(address);
  await userEvent.click(await rowOf("A1"));
  const form = within(await formOf("A1"));
  await userEvent.type(form.getByLabelText("Count"), "7");
  await userEvent.type(form.getByLabelText(/^Note/), "wet");
  await userEvent.click(form.getByRole("button", { name: "Save: 7 spikes" }));
  await form.findByText(/nothing was lost here/);
  // Another cell is looked at in between.
  await userEvent.click(await rowOf("A2"));
  await userEvent.type(within(await formOf("A2")).getByLabelText("Count"), "5");
  await userEvent.click(await rowOf("A1"));
  const again = within(await formOf("A1"));
  expect(again.getByLabelText<HTMLInputElement>("Count").value).toBe("7");
  expect(again.getByLabelText<HTMLInputElement>(/^Note/).value).toBe("wet");
  lost = false;
  await userEvent.click(again.getByRole("button", { name: "Save: 7 spikes" }));
  const next = within(await formOf("A2"));
  expect(next.getByLabelText<HTMLInputElement>("Count").value).toBe("5");
  const ids = api.named("enterCounts").map(({ body }) => (body as { entries: { id: string }[] }).entries[0]?.id);
  expect(ids).toHaveLength(2);
  expect(new Set(ids).size).toBe(1);
});

test("a cell that was given a count meanwhile: the form stays with what was typed, which can go into an amendment", async () => {
  const { api, state } = open(["lead"], [visit(1)]);
  api
    .on(enterCounts, () => {
      state.visits = [visit(1, { count: inForce(4) })];
      throw new Problem("count-exists", "Cell A1 has one: 4. Amend it, with a reason.");
    })
    .on(amendCount, ({ body }) => visit(1, { count: inForce(7, { entryId: body.id, amended: true }) }))
    .on(listEntries, () => ({ entries: [] }))
    .install();
  renderApp(address);
  await userEvent.click(await rowOf("A1"));
  const form = within(await formOf("A1"));
  await userEvent.type(form.getByLabelText("Count"), "7");
  await userEvent.click(form.getByRole("button", { name: "Save: 7 spikes" }));
  await screen.findByText(/Cell A1 has one: 4/);
  await screen.findByText(/A1 was given a count meanwhile: 4 spikes, by Tove Lind/);
  await userEvent.click(screen.getByRole("button", { name: "Amend it…" }));
  const amendment = within(await screen.findByRole("form", { name: "Amendment of A1" }));
  expect(amendment.getByLabelText<HTMLInputElement>("Count").value).toBe("7");
});

test("an amendment needs its reason, and names the entry that it replaces", async () => {
  const { api, state } = open(["lead"], [visit(1, { count: inForce(3) })]);
  api
    .on(amendCount, ({ body }) => {
      state.visits = [visit(1, { count: inForce(8, { entryId: body.id, amended: true }) })];
      return visit(1, { count: inForce(8, { entryId: body.id, amended: true }) });
    })
    .install();
  renderApp(address);
  await userEvent.click(await rowOf("A1"));
  screen.getByText("3 spikes, by Tove Lind, 5 June 2031, 11:00 CEST.");
  await userEvent.click(screen.getByRole("button", { name: "Amend…" }));
  const form = within(screen.getByRole("form", { name: "Amendment of A1" }));
  await userEvent.type(form.getByLabelText("Count"), "8");
  await userEvent.click(form.getByRole("button", { name: "Amend to 8 spikes" }));
  form.getByText("Say why: it stands in the record.");
  expect(document.activeElement).toBe(form.getByLabelText("Why it is amended"));
  expect(api.named("amendCount")).toEqual([]);
  await userEvent.type(form.getByLabelText("Why it is amended"), "misread the sheet");
  await userEvent.click(form.getByRole("button", { name: "Amend to 8 spikes" }));
  await screen.findByText("8 spikes, by Tove Lind, 5 June 2031, 11:00 CEST, amended.");
  expect(api.named("amendCount")[0]?.body).toMatchObject({
    replaces: inForce(3).entryId,
    said: { state: "counted", value: 8 },
    reason: "misread the sheet",
  });
});

test("an amendment of what was amended meanwhile is refused, and stays typed beside what is in force now", async () => {
  const { api, state } = open(["planner"], [visit(1, { count: inForce(3) })]);
  api
    .on(amendCount, () => {
      state.visits = [visit(1, { count: inForce(9) })];
      throw new Problem("changed-meanwhile", "It is 9 now. Look again.");
    })
    .install();
  renderApp(address);
  await userEvent.click(await rowOf("A1"));
  await userEvent.click(screen.getByRole("button", { name: "Amend…" }));
  const form = within(screen.getByRole("form", { name: "Amendment of A1" }));
  await userEvent.type(form.getByLabelText("Count"), "8");
  await userEvent.type(form.getByLabelText("Why it is amended"), "misread the sheet");
  await userEvent.click(form.getByRole("button", { name: "Amend to 8 spikes" }));
  await screen.findByText(/It is 9 now/);
  await screen.findByText(/^9 spikes, by Tove Lind/);
  expect(form.getByLabelText<HTMLTextAreaElement>("Why it is amended").value).toBe("misread the sheet");
});

// A date without a time is kept as the day's first moment: 00:00 of 3 June in Paris (UTC+2) is 22:00 UTC of 2 June.
test("a count that tells only its day shows the day, and its history who counted and who wrote it down", async () => {
  const id = "0c4a7a4e-4f43-4d52-9f0f-1f2e7a0c0009";
  const { api } = open(["lead"], [visit(1, { count: inForce(3, { at: "2031-06-02T22:00:00Z" }) })]);
  const told = { id, visitId: "v1", targetId: "t1", purpose: "first", state: "counted", value: 3 } as const;
  const who = { observer: "Tove Lind", enteredBy: "Ines Marrow", note: "", replaces: null, reason: "" };
  const times = { madeAt: "2031-06-02T22:00:00Z", enteredAt: "2031-06-04T08:00:00Z" };
  api.on(listEntries, () => ({ entries: [{ ...told, ...who, ...times }] })).install();
  renderApp(address);
  await userEvent.click(await rowOf("A1"));
  screen.getByText("3 spikes, by Tove Lind, 3 June 2031.");
  await userEvent.click(screen.getByText("All that was written down"));
  await screen.findByText(", by Tove Lind, 3 June 2031, written down by Ines Marrow", { exact: false });
});

test("the auditor reads the counts and has nothing to press", async () => {
  const { api } = open(["auditor"], [visit(1, { count: reported("unsafe") }), visit(2)]);
  api.install();
  renderApp(address);
  await screen.findByText("Your role here reads the counts and changes none.");
  await userEvent.click(await rowOf("A1"));
  screen.getByText(/^unsafe, by Tove Lind/);
  expect(within(await gridOf()).queryByRole("button", { name: /Amend|Save/ })).toBeNull();
  expect(document.querySelector('input[type="file"]')).toBeNull();
});
