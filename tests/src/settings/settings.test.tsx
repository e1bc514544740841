import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import {
  archiveSurvey,
  changeSettings,
  copySurvey,
  deleteSurvey,
  readSettings,
  type SurveySettings,
  unarchiveSurvey,
} from "#shared/api/settings.ts";
import { listSurveys, readSurvey } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import type { Role } from "#shared/access/table.ts";
import { FakeApi, versionOf } from "../app/fake-api.ts";
import { session, survey } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

afterEach(() => {
  vi.unstubAllGlobals();
});

const began: SurveySettings = {
  name: "Pellimere Fen",
  timeZone: "Europe/Paris",
  level: "0.95",
  sensitivity: "open",
  safetyNotes: "",
  targets: [{ id: "t1", singular: "spike", plural: "spikes", countingRule: "", wholeNumbers: true }],
  season: { id: "y1", name: "2031", startsOn: null, endsOn: null },
};

/** A server that holds settings as the real one does; the test may change them between two calls. */
function open(roles: Role[] = ["planner"], part: { archivedAt?: string } = {}) {
  const state = { settings: began };
  const api = new FakeApi()
    .on(readSession, () => session())
    .on(readSurvey, () => survey(roles, { name: state.settings.name, archivedAt: part.archivedAt ?? null }))
    .on(listSurveys, () => ({ surveys: [], installation: null }))
    .on(readSettings, () => state.settings)
    .on(changeSettings, ({ body, version }) => {
      if (version !== versionOf(state.settings)) {
        const question = { kind: "versions", current: state.settings, version: versionOf(state.settings) };
        throw new Problem("changed-meanwhile", "Look at both versions.", question);
      }
      state.settings = body;
      return body;
    });
  return { api, state };
}

const address = "/surveys/s1/settings";
const keep = () => userEvent.click(screen.getByRole("button", { name: "Keep the settings" }));

async function type(label: string, text: string) {
  const field = await screen.findByLabelText(label);
  await userEvent.clear(field);
  if (text !== "") await userEvent.type(field, text);
}

test("a planner changes what is set, and all of it is sent on the version that was seen", async () => {
  const { api } = open();
  api.install();
  renderApp(address);
  await type("Name of the survey", " Fen, north ");
  await type("Season", "Summer 2031");
  await type("First day may stay empty", "2031-05-01");
  await type("Last day may stay empty", "2031-08-31");
  await userEvent.selectOptions(screen.getByLabelText("Time zone of the place"), "Europe/London");
  await type("Several of them", "flower spikes");
  await type("Counting rule may stay empty", "not broken ones");
  await userEvent.selectOptions(screen.getByLabelText("A count is"), "a measured amount, with decimals");
  await type("Confidence level", "90 %");
  await userEvent.click(screen.getByRole("radio", { name: /^High/ }));
  await type("What people must know before they go out may stay empty", "Tides.");
  await keep();
  await screen.findByText("Nothing is changed yet.");
  expect(api.named("changeSettings").map(({ body }) => body)).toEqual([
    {
      name: "Fen, north",
      timeZone: "Europe/London",
      level: "0.9",
      sensitivity: "high",
      safetyNotes: "Tides.",
      targets: [
        { id: "t1", singular: "spike", plural: "flower spikes", countingRule: "not broken ones", wholeNumbers: false },
      ],
      season: { id: "y1", name: "Summer 2031", startsOn: "2031-05-01", endsOn: "2031-08-31" },
    },
  ]);
});

test("what cannot be meant is told at its field and not sent", async () => {
  const { api } = open();
  api.install();
  renderApp(address);
  await type("Name of the survey", "");
  await type("First day may stay empty", "2031-06-02");
  await type("Last day may stay empty", "2031-06-01");
  await type("Confidence level", "100");
  await keep();
  await screen.findByText("Give the survey a name: the place is usually best.");
  screen.getByText("The season ends before it starts: mend one of the two days.");
  screen.getByText(/No limits are 100 % sure/);
  await waitFor(() => {
    expect(document.activeElement).toBe(screen.getByLabelText("Name of the survey"));
  });
  expect(api.named("changeSettings")).toEqual([]);
});

test("a refusal of the server stands beside the button, and nothing that was typed is lost", async () => {
  const { api } = open();
  api
    .on(changeSettings, () => {
      throw new Problem("counts-not-whole", "One count has decimals.");
    })
    .install();
  renderApp(address);
  await type("Name of the survey", "Fen, north");
  await keep();
  expect((await screen.findByRole("alert")).textContent).toContain("One count has decimals.");
  expect(screen.getByLabelText<HTMLInputElement>("Name of the survey").value).toBe("Fen, north");
});

test("what somebody else changed meanwhile is shown beside one's own, and the choice is sent on their version", async () => {
  const { api, state } = open();
  api.install();
  renderApp(address);
  await type("Name of the survey", "Mine");
  await type("What people must know before they go out may stay empty", "Tides.");
  state.settings = { ...began, name: "Theirs", level: "0.9" };
  await keep();
  await screen.findByRole("heading", { name: "Both versions" });
  const group = (name: string) => within(screen.getByRole("group", { name }));
  // Both changed the name; only they the level; only I the notes.
  expect(screen.getAllByRole("group").map((one) => one.querySelector("legend")?.textContent)).toEqual([
    "Name of the survey",
    "Confidence level",
    "Safety notes",
  ]);
  group("Confidence level").getByRole("radio", { name: /^Take theirs/, checked: true });
  group("Safety notes").getByRole("radio", { name: /^Keep mine/, checked: true });
  await userEvent.click(group("Name of the survey").getByRole("radio", { name: /^Keep mine/ }));
  await userEvent.click(screen.getByRole("button", { name: "Keep what is chosen" }));
  await screen.findByText("Nothing is changed yet.");
  expect(state.settings).toEqual({ ...began, name: "Mine", level: "0.9", safetyNotes: "Tides." });
  expect((await screen.findByLabelText<HTMLInputElement>("Name of the survey")).value).toBe("Mine");
});

test("while nothing is typed, what somebody else kept is simply shown", async () => {
  const { api, state } = open();
  api.install();
  const { queries } = renderApp(address);
  await screen.findByLabelText("Name of the survey");
  state.settings = { ...began, name: "Theirs" };
  await queries.invalidateQueries();
  await waitFor(() => {
    expect(screen.getByLabelText<HTMLInputElement>("Name of the survey").value).toBe("Theirs");
  });
});

test("everybody else reads the settings and has nothing to press", async () => {
  for (const role of ["lead", "counter", "auditor"] as const) {
    const { api } = open([role]);
    api.install();
    renderApp(address);
    await screen.findByText("A planner of the survey changes these.");
    await screen.findByText(/^Open\. Anybody may know the places/);
    expect(screen.queryByRole("button", { name: /Keep|Copy|Archive|Delete/ })).toBeNull();
    expect(screen.getAllByRole("link", { name: "Settings", current: "page" }).length).toBeGreaterThan(0);
    document.body.replaceChildren();
  }
});

test("a survey is archived, and an archived one is read and taken out again", async () => {
  const { api } = open();
  api.on(archiveSurvey, () => survey(["planner"], { archivedAt: "2031-09-01T08:00:00Z" })).install();
  renderApp(address);
  await userEvent.click(await screen.findByRole("button", { name: "Archive the survey" }));
  await waitFor(() => {
    expect(api.named("archiveSurvey")).toHaveLength(1);
  });
});

test("while it is archived nothing can be changed, and it can be taken out", async () => {
  const { api } = open(["planner"], { archivedAt: "2031-09-01T08:00:00Z" });
  api.on(unarchiveSurvey, () => survey()).install();
  renderApp(address);
  await userEvent.click(await screen.findByRole("button", { name: "Take out of the archive" }));
  expect(screen.queryByRole("button", { name: "Keep the settings" })).toBeNull();
  await waitFor(() => {
    expect(api.named("unarchiveSurvey")).toHaveLength(1);
  });
});

test("a copy needs a name and a season, and opens with its own settings", async () => {
  const { api } = open();
  api.on(copySurvey, () => survey(["planner"], { id: "s2", name: "Pellimere Fen" })).install();
  const { router } = renderApp(address);
  const button = await screen.findByRole("button", { name: "Copy for a next season" });
  await userEvent.click(button);
  await screen.findByText("Name the season, for example by its year.");
  expect(api.named("copySurvey")).toEqual([]);
  await type("Its season", "2032");
  await userEvent.click(screen.getByRole("checkbox", { name: /With the people/ }));
  await userEvent.click(button);
  await waitFor(() => {
    expect(router.state.location.pathname).toBe("/surveys/s2/settings");
  });
  expect(api.named("copySurvey")[0]?.body).toEqual({ name: "Pellimere Fen", seasonName: "2032", withPeople: false });
});

test("before a survey is deleted its record file is offered, and its name is typed", async () => {
  const { api } = open();
  api
    .on(deleteSurvey, ({ body }) => {
      if (body.name !== "Pellimere Fen") throw new Problem("name-differs", "Type “Pellimere Fen” as it stands.");
      return {};
    })
    .install();
  const { router } = renderApp(address);
  await userEvent.click(await screen.findByRole("button", { name: "Delete the survey…" }));
  const dialog = within(await screen.findByRole("dialog", { name: "Delete Pellimere Fen" }));
  expect(dialog.getByRole("link", { name: "Save the record file" }).getAttribute("href")).toBe(
    "/api/surveys/s1/record",
  );
  await userEvent.type(dialog.getByLabelText("Name of the survey"), "Pellimere");
  await userEvent.click(dialog.getByRole("button", { name: "Delete for good" }));
  await dialog.findByText(/as it stands\./);
  await userEvent.type(dialog.getByLabelText("Name of the survey"), " Fen");
  await userEvent.click(dialog.getByRole("button", { name: "Delete for good" }));
  await waitFor(() => {
    expect(router.state.location.pathname).toBe("/surveys");
  });
});
