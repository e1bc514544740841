import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import { listAreas } from "#shared/api/area.ts";
import { createSurvey, listOtherSurveys, listSurveys, readSurvey } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import type { Role } from "#shared/access/table.ts";
import { FakeApi } from "../app/fake-api.ts";
import { listed, session, stages, survey } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

afterEach(() => {
  vi.unstubAllGlobals();
});

function signedIn(roles: Role[] = ["planner"]) {
  return new FakeApi()
    .on(readSession, () => session())
    .on(readSurvey, () => survey(roles))
    .on(listAreas, () => ({ areas: [] }));
}

test("the first day says what a survey needs and offers to start one", async () => {
  signedIn()
    .on(listSurveys, () => ({ surveys: [], installation: null }))
    .install();
  renderApp("/surveys");
  await screen.findByRole("heading", { name: "No surveys yet. Start with the ground." });
  expect(screen.getByRole("link", { name: "Start a survey" }).getAttribute("href")).toBe("/surveys/new");
});

test("the list tells what waits as whom, and the stage that matters of each survey", async () => {
  const inWork = listed(["planner"], {
    stages: stages({
      area: { state: "done", note: "1 area" },
      frame: { state: "in-work", note: "version 1, not sealed" },
    }),
    waiting: [{ kind: "sealing", role: "planner", draft: 1 }],
  });
  const watched = listed(["auditor"], { id: "s2", name: "Dunmarrow Links" });
  signedIn()
    .on(listSurveys, () => ({ surveys: [inWork, watched], installation: null }))
    .install();
  renderApp("/surveys");
  await screen.findByRole("heading", { name: "One thing waits for you." });
  screen.getByText("As planner");
  screen.getByText("Frame version 1 is not sealed.");
  expect(screen.getByRole("link", { name: "Seal the frame" }).getAttribute("href")).toBe("/surveys/s1/frame");
  const rows = within(screen.getByRole("table", { name: "Your surveys" })).getAllByRole("row");
  expect(rows).toHaveLength(3);
  expect(rows[1]?.textContent).toContain("Frame: version 1, not sealed");
  expect(rows[2]?.textContent).toContain("Dunmarrow Links");
  expect(rows[2]?.textContent).toContain("3 May 20317");
});

test("the search goes along with the typing: the slash key comes to it, Enter opens the first, Escape empties it", async () => {
  const links = listed(["auditor"], { id: "s2", name: "Dunmarrow Links", target: "dune helleborines" });
  const old = listed(["planner"], {
    id: "s3",
    name: "Pellimere Fen",
    season: "2029",
    archivedAt: "2030-01-02T08:00:00Z",
  });
  signedIn()
    .on(listSurveys, () => ({ surveys: [listed(), links, old], installation: null }))
    .install();
  const { router } = renderApp("/surveys");
  const user = userEvent.setup({ delay: null });
  await screen.findByRole("table", { name: "Your surveys" });
  await user.keyboard("/");
  const search = screen.getByRole("searchbox", { name: /Find a survey/ });
  expect(document.activeElement).toBe(search);
  await user.keyboard("helle");
  const names = () => screen.getAllByRole("link", { name: /Fen|Links/ }).map((link) => link.textContent);
  expect(names()).toEqual(["Dunmarrow Links"]);
  screen.getByText("1 of 3 surveys");
  await user.keyboard("{Escape}");
  expect(names()).toEqual(["Pellimere Fen", "Dunmarrow Links", "Pellimere Fen"]);
  await user.keyboard("{ArrowDown}{ArrowDown}");
  expect(document.activeElement?.textContent).toBe("Dunmarrow Links");
  await user.type(search, "fen");
  await user.keyboard("{Enter}");
  await waitFor(() => {
    expect(router.state.location.pathname).toContain("/surveys/s1");
  });
});

test("archived surveys lie in a fold of their own, which opens for what is looked for in it", async () => {
  const old = listed(["planner"], { id: "s3", name: "Wetherlow Moor", archivedAt: "2030-01-02T08:00:00Z" });
  signedIn()
    .on(listSurveys, () => ({ surveys: [listed(), old], installation: null }))
    .install();
  renderApp("/surveys");
  const table = await screen.findByRole("table", { name: "Your surveys" });
  expect(within(table).queryByText("Wetherlow Moor")).toBeNull();
  const fold = () => screen.getByText("Archived surveys", { selector: "summary span" }).closest("details");
  expect(fold()?.open).toBe(false);
  within(fold() ?? document.body).getByText("Archived on 2 January 2030");
  await userEvent.type(screen.getByRole("searchbox"), "moor");
  expect(fold()?.open).toBe(true);
  screen.getByText(/No survey in work has “moor”/);
});

test("an archived survey says so in its header", async () => {
  signedIn()
    .on(readSurvey, () => survey(["planner"], { archivedAt: "2032-01-02T23:30:00Z" }))
    .install();
  renderApp("/surveys/s1/area");
  // 23:30 UTC is past midnight in Paris, where the survey is.
  await screen.findByText("marsh-orchid spikes, season 2031 · archived on 3 January 2032");
});

test("what the installation waits for is told to its owner, also before there is a survey", async () => {
  const installation = { mailsFailed: 1, mailsKept: 0, publicAddressMissing: true, backupError: null };
  signedIn()
    .on(listSurveys, () => ({ surveys: [], installation }))
    .install();
  renderApp("/surveys");
  await screen.findByText("One mail could not be sent.");
  expect(screen.getByRole("link", { name: "Look at the mails" }).getAttribute("href")).toBe("/installation#mails");
});

test("a survey's own address leads to the stage that matters", async () => {
  signedIn().install();
  const { router } = renderApp("/surveys/s1");
  await waitFor(() => {
    expect(router.state.location.pathname).toBe("/surveys/s1/area");
  });
});

test("a counter sees Field and Counts only, and another stage's address says why it is not shown", async () => {
  signedIn(["counter"]).install();
  renderApp("/surveys/s1/area");
  await screen.findByRole("heading", { name: "The Area stage is not for your role." });
  const rail = screen.getAllByRole("navigation", { name: "Stages of this survey" })[0];
  if (rail === undefined) throw new Error("no rail");
  expect(
    within(rail)
      .getAllByRole("link")
      .map((link) => link.getAttribute("href"))
      // Below the stations lie pages that are no stages.
      .filter((address) => !/people|settings/.test(address ?? "")),
  ).toEqual(["/surveys/s1/field", "/surveys/s1/counts"]);
});

test("a survey that is not there, or not for this person, is refused by name with a way back", async () => {
  signedIn()
    .on(readSurvey, () => {
      throw new Problem("survey-not-found", "Check the address, or ask a planner of the survey to add you.");
    })
    .install();
  renderApp("/surveys/s9/area");
  expect((await screen.findByRole("alert")).textContent).toContain("There is no such survey here.");
  screen.getByRole("link", { name: "To the surveys" });
});

test("a new survey names what lacks before anything is sent", async () => {
  const api = signedIn().install();
  renderApp("/surveys/new");
  await userEvent.click(await screen.findByRole("button", { name: "Start the survey" }));
  await screen.findByText("Give the survey a name: the place is usually best.");
  screen.getByText("Write what one of them is called: “spike”.");
  expect(api.named("createSurvey")).toEqual([]);
});

test("a new survey carries the browser's time zone and whole numbers unless told otherwise", async () => {
  const api = signedIn()
    .on(createSurvey, () => survey())
    .install();
  const { router } = renderApp("/surveys/new");
  const user = userEvent.setup({ delay: null });
  await user.type(await screen.findByLabelText("Name of the survey"), " Pellimere Fen ");
  await user.type(screen.getByLabelText("One of what is counted"), "spike");
  await user.type(screen.getByLabelText("Several of them"), "spikes");
  await user.clear(screen.getByLabelText("Season"));
  await user.type(screen.getByLabelText("Season"), "2031");
  await user.click(screen.getByRole("button", { name: "Start the survey" }));
  await waitFor(() => {
    expect(router.state.location.pathname).toBe("/surveys/s1/area");
  });
  expect(api.named("createSurvey")[0]?.body).toEqual({
    name: "Pellimere Fen",
    targetSingular: "spike",
    targetPlural: "spikes",
    countingRule: "",
    wholeNumbers: true,
    seasonName: "2031",
    timeZone: Intl.DateTimeFormat().resolvedOptions().timeZone,
    safetyNotes: "",
  });
});

test("an owner finds the surveys in which they hold no role, each with the way to its people", async () => {
  const account = { id: "a1", name: "Ines Marrow", email: "ines@example.org", isOwner: true };
  signedIn()
    .on(readSession, () => session({ account }))
    .on(listSurveys, () => ({ surveys: [], installation: null }))
    .on(listOtherSurveys, () => ({
      surveys: [{ id: "s7", name: "Dunmarrow Links", createdAt: "2031-05-02T08:00:00Z" }],
    }))
    .install();
  renderApp("/surveys");
  await screen.findByRole("heading", { name: "Other surveys of this installation" });
  expect(screen.getByRole("link", { name: "People of Dunmarrow Links" }).getAttribute("href")).toBe(
    "/surveys/s7/people",
  );
});

test("who is no owner is not asked about other surveys", async () => {
  const api = signedIn()
    .on(listSurveys, () => ({ surveys: [listed()], installation: null }))
    .install();
  renderApp("/surveys");
  await screen.findByRole("table", { name: "Your surveys" });
  expect(api.named("listOtherSurveys")).toEqual([]);
});
