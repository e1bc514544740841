import { screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession, signIn, signOut } from "#shared/api/accounts.ts";
import { listSurveys } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import { FakeApi } from "../app/fake-api.ts";
import { session } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

afterEach(() => {
  vi.unstubAllGlobals();
});

const nobody = session({ account: null });

function signedOut() {
  return new FakeApi().on(readSession, () => nobody).on(listSurveys, () => ({ surveys: [], installation: null }));
}

async function typeIn(email: string, password: string) {
  const user = userEvent.setup({ delay: null });
  await user.type(await screen.findByLabelText("E-mail"), email);
  await user.type(screen.getByLabelText("Password"), password);
  await user.click(screen.getByRole("button", { name: "Sign in" }));
}

test("a refused sign-in says so and keeps what was typed", async () => {
  const refusal = new Problem("sign-in-refused", "Check both, then try again.");
  signedOut()
    .on(signIn, () => {
      throw refusal;
    })
    .install();
  renderApp("/sign-in");
  await typeIn("ines@example.org", "not the one");
  expect((await screen.findByRole("alert")).textContent).toBe(`${refusal.title}. Check both, then try again.`);
  expect(screen.getByDisplayValue("ines@example.org")).toBe(screen.getByLabelText("E-mail"));
  expect(screen.getByDisplayValue("not the one")).toBe(screen.getByLabelText("Password"));
});

test("empty fields are named, the first takes the focus, and nothing is sent", async () => {
  const api = signedOut().install();
  renderApp("/sign-in");
  await userEvent.click(await screen.findByRole("button", { name: "Sign in" }));
  screen.getByText("Write the address of your account.");
  screen.getByText("Write the password of your account.");
  expect(document.activeElement).toBe(screen.getByLabelText("E-mail"));
  expect(api.named("signIn")).toEqual([]);
});

test("whoever opens a page without a session signs in first and comes back to it", async () => {
  const api = signedOut()
    .on(signIn, () => session())
    .install();
  const { router } = renderApp("/account");
  await waitFor(() => {
    expect(router.state.location.pathname).toBe("/sign-in");
  });
  await typeIn("ines@example.org", "a long enough sentence");
  await waitFor(() => {
    expect(router.state.location.pathname).toBe("/account");
  });
  expect(api.named("signIn")[0]?.body).toEqual({ email: "ines@example.org", password: "a long enough sentence" });
});

test("an address of another site is not returned to after signing in", async () => {
  new FakeApi()
    .on(readSession, () => session())
    .on(listSurveys, () => ({ surveys: [], installation: null }))
    .install();
  const { router } = renderApp("/sign-in?next=//evil.example/x");
  await waitFor(() => {
    expect(router.state.location.pathname).toBe("/surveys");
  });
});

test("signing out leads to the sign-in page", async () => {
  const api = new FakeApi()
    .on(readSession, () => session())
    .on(signOut, () => nobody)
    .install();
  const { router } = renderApp("/account");
  await userEvent.click(await screen.findByRole("button", { name: "Sign out" }));
  await waitFor(() => {
    expect(router.state.location.pathname).toBe("/sign-in");
  });
  expect(api.named("signOut")).toHaveLength(1);
});

test("the demo says so on its pages, a real installation does not", async () => {
  new FakeApi().on(readSession, () => session({ demo: true })).install();
  renderApp("/account");
  await screen.findByText("This is the demo.");
});
