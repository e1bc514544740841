import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession, signIn } from "#shared/api/accounts.ts";
import { addPerson, listPeople } from "#shared/api/people.ts";
import { readSurvey } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import { FakeApi } from "../app/fake-api.ts";
import { session, survey } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

afterEach(() => {
  vi.unstubAllGlobals();
});

const tom = { id: "a2", name: "Tom Ashby", email: "tom@example.org", isOwner: false };

/** A form with something typed in it, whose sending found the session ended. */
async function endedPage() {
  let isIn = true;
  const inside = <T,>(answer: T): T => {
    if (!isIn) throw new Problem("not-signed-in", "Sign in, then try again.");
    return answer;
  };
  const api = new FakeApi()
    .on(readSession, () => session(isIn ? {} : { account: null }))
    .on(readSurvey, () => inside(survey(["planner"])))
    .on(listPeople, () => inside({ members: [], invitations: [] }))
    .on(addPerson, () => inside({ members: [], invitations: [] }))
    .on(signIn, ({ body }) => {
      isIn = true;
      return body.email === tom.email ? session({ account: tom }) : session();
    })
    .install();
  const app = renderApp("/surveys/s1/people");
  const user = userEvent.setup({ delay: null });
  await user.type(await screen.findByLabelText("E-mail"), "new@example.org");
  isIn = false;
  await user.click(screen.getByRole("button", { name: "Add to the survey" }));
  const dialog = await screen.findByRole("dialog", { name: "Sign in again to go on" });
  return { ...app, api, user, dialog };
}

test("a session that ended is signed in to over the page, and what was typed is still there", async () => {
  const { api, user, dialog, router } = await endedPage();
  const email = within(dialog).getByLabelText<HTMLInputElement>("E-mail");
  expect(email.value).toBe("ines@example.org");
  await user.keyboard("{Escape}");
  await user.type(within(dialog).getByLabelText("Password"), "a long enough sentence");
  await user.click(within(dialog).getByRole("button", { name: "Sign in" }));
  await waitFor(() => {
    expect(screen.queryByRole("dialog")).toBeNull();
  });
  expect(router.state.location.pathname).toBe("/surveys/s1/people");
  expect(screen.getByLabelText<HTMLInputElement>("E-mail").value).toBe("new@example.org");
  await user.click(screen.getByRole("button", { name: "Add to the survey" }));
  await waitFor(() => {
    expect(api.named("addPerson").map(({ body }) => body)).toEqual([
      { email: "new@example.org", role: "counter" },
      { email: "new@example.org", role: "counter" },
    ]);
  });
});

test("if somebody else signs in there, the page begins anew and asks the server again", async () => {
  const { api, user, dialog } = await endedPage();
  const before = api.named("readSurvey").length;
  await user.clear(within(dialog).getByLabelText("E-mail"));
  await user.type(within(dialog).getByLabelText("E-mail"), tom.email);
  await user.type(within(dialog).getByLabelText("Password"), "a long enough sentence");
  await user.click(within(dialog).getByRole("button", { name: "Sign in" }));
  await screen.findByRole("button", { name: "Account of Tom Ashby, planner" });
  expect((await screen.findByLabelText<HTMLInputElement>("E-mail")).value).toBe("");
  expect(api.named("readSurvey").length).toBeGreaterThan(before);
});

test("a question that finds the session ended opens the dialog too, and leaving the page leads to the sign-in page", async () => {
  const { user, dialog, router, queries } = await endedPage();
  await queries.refetchQueries();
  expect(screen.getByRole("dialog")).toBe(dialog);
  await user.click(within(dialog).getByRole("link", { name: "Leave this page" }));
  await waitFor(() => {
    expect(router.state.location.pathname + router.state.location.search).toBe(
      `/sign-in?next=${encodeURIComponent("/surveys/s1/people")}`,
    );
  });
});
