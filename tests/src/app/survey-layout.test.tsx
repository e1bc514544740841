import { screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import { listDraws } from "#shared/api/draw.ts";
import { listFrames } from "#shared/api/frame.ts";
import { readSurvey } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import { drawList } from "../draw/draw-fixtures.ts";
import { FakeApi } from "./fake-api.ts";
import { sealed, session, survey } from "./fixtures.ts";
import { renderApp } from "./render-app.tsx";

afterEach(() => {
  vi.unstubAllGlobals();
});

/** A page with something typed on it, and a server that answers what `fail` throws from then on. */
async function typedPage(fail: () => never) {
  let failing = false;
  const api = new FakeApi()
    .on(readSession, () => (failing ? fail() : session()))
    .on(readSurvey, () => (failing ? fail() : survey(["planner"])))
    .on(listFrames, () => ({ frames: [sealed()] }))
    .on(listDraws, () => drawList())
    .install();
  const { queries } = renderApp("/surveys/s1/draw");
  await userEvent.type(await screen.findByLabelText("Picks, n"), "12");
  failing = true;
  await queries.refetchQueries();
  return { api };
}

test("a page keeps what is typed on it when asking for survey and session again fails", async () => {
  const { api } = await typedPage(() => {
    throw new Problem("unreachable", "Check the network, then try again.");
  });
  expect(api.named("readSurvey").length).toBeGreaterThan(1);
  expect(api.named("readSession").length).toBeGreaterThan(1);
  expect(screen.getByLabelText<HTMLInputElement>("Picks, n").value).toBe("12");
});

test("a survey that is not there any more for this person is not shown any longer", async () => {
  await typedPage(() => {
    throw new Problem("survey-not-found", "Ask a planner of the survey.");
  });
  expect((await screen.findByRole("alert")).textContent).toContain("There is no such survey here.");
  await waitFor(() => {
    expect(screen.queryByLabelText("Picks, n")).toBeNull();
  });
});
