import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import { listAreas } from "#shared/api/area.ts";
import {
  addMember,
  createSurvey,
  listMembers,
  listOtherSurveys,
  listSurveys,
  readSurvey,
} from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import type { Role } from "#shared/access/table.ts";
import { FakeApi } from "../app/fake-api.ts";
import { session, stages, survey } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

afterEach(() => {
  vi.unstubAllGlobals();
});

const ines = {
  id: "m1",
  name: "Ines Marrow",
  email: "ines@example.org",
  roles: ["planner" as Role],
  addedAt: "2031-05-02T08:00:00Z",
};

function signedIn(roles: Role[] = ["planner"]) {
  return new FakeApi()
    .on(readSession, () => session())
    .on(readSurvey, () => survey(roles))
    .on(listAreas, () => ({ areas: [] }))
    .on(listMembers, () => ({ members: [ines] }));
}

test("the first day says what a survey needs and offers to start one", async () => {
  signedIn()
    .on(listSurveys, () => ({ surveys: [] }))
    .install();
  renderApp("/surveys");
  await screen.findByRole("heading", { name: "No surveys yet. Start with the ground." });
  expect(screen.getByRole("link", { name: "Start a survey" }).getAttribute("href")).toBe("/surveys/new");
});

test("the list tells what waits as whom, and the stage that matters of each survey", async () => {
  const inWork = survey(["planner"], {
    stages: stages({
      area: { state: "done", note: "1 area" },
      frame: { state: "in-work", note: "version 1, not sealed" },
    }),
  });
  const watched = survey(["auditor"], { id: "s2", name: "Dunmarrow Links" });
  signedIn()
    .on(listSurveys, () => ({ surveys: [inWork, watched] }))
    .install();
  renderApp("/surveys");
  await screen.findByRole("heading", { name: "One thing waits for you." });
  screen.getByText("As planner");
  screen.getByText("Frame: version 1, not sealed.");
  expect(screen.getByRole("link", { name: "Choose the cells" }).getAttribute("href")).toBe("/surveys/s1/frame");
  const rows = within(screen.getByRole("table", { name: "Your surveys" })).getAllByRole("row");
  expect(rows).toHaveLength(3);
  expect(rows[2]?.textContent).toContain("Dunmarrow Links");
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
      .map((link) => link.getAttribute("href")),
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

test("an address without an account is refused, and the refusal offers to make one", async () => {
  let members = [ines];
  const api = signedIn()
    .on(listMembers, () => ({ members }))
    .on(addMember, ({ body: { newAccount, email, role } }) => {
      if (newAccount === undefined) throw new Problem("account-not-found", "Give a name and a first password.");
      members = [...members, { ...ines, id: "m2", name: newAccount.name, email, roles: [role] }];
      return { members };
    })
    .install();
  renderApp("/surveys/s1/people");
  const user = userEvent.setup({ delay: null });
  await user.type(await screen.findByLabelText("E-mail"), "tom@example.org");
  await user.click(screen.getByRole("button", { name: "Add to the survey" }));
  await user.click(await screen.findByRole("button", { name: "Make an account for them" }));
  expect(document.activeElement).toBe(screen.getByLabelText("Name"));
  screen.getByDisplayValue("tom@example.org");
  await user.type(screen.getByLabelText("Name"), "Tom Ashby");
  await user.type(screen.getByLabelText("First password"), "short");
  await user.click(screen.getByRole("button", { name: "Add to the survey" }));
  screen.getByText("Use twelve characters or more; a short sentence is easy to remember.");
  await user.type(screen.getByLabelText("First password"), " and then longer");
  await user.click(screen.getByRole("button", { name: "Add to the survey" }));
  await screen.findByText("Tom Ashby");
  expect(api.named("addMember").at(-1)?.body).toEqual({
    email: "tom@example.org",
    role: "counter",
    newAccount: { name: "Tom Ashby", password: "short and then longer" },
  });
});

test("who may not change people sees them and no form", async () => {
  signedIn(["lead"]).install();
  renderApp("/surveys/s1/people");
  await screen.findByText("ines@example.org");
  expect(screen.queryByRole("button", { name: "Add to the survey" })).toBeNull();
});

test("an owner of the installation reaches the people of a survey without a role in it", async () => {
  const account = { id: "a1", name: "Ines Marrow", email: "ines@example.org", isOwner: true };
  signedIn()
    .on(readSession, () => session({ account }))
    .on(readSurvey, () => {
      throw new Problem("survey-not-found", "Check the address.");
    })
    .install();
  renderApp("/surveys/s1/people");
  await screen.findByText("1 person in this survey.");
  screen.getByRole("button", { name: "Add to the survey" });
});

test("an owner finds the surveys in which they hold no role, each with the way to its people", async () => {
  const account = { id: "a1", name: "Ines Marrow", email: "ines@example.org", isOwner: true };
  signedIn()
    .on(readSession, () => session({ account }))
    .on(listSurveys, () => ({ surveys: [] }))
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
    .on(listSurveys, () => ({ surveys: [survey()] }))
    .install();
  renderApp("/surveys");
  await screen.findByRole("table", { name: "Your surveys" });
  expect(api.named("listOtherSurveys")).toEqual([]);
});
