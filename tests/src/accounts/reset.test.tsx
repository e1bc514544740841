import { screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import { readReset, requestReset, useReset } from "#shared/api/people.ts";
import { listSurveys } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import { FakeApi } from "../app/fake-api.ts";
import { session } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

afterEach(() => {
  vi.unstubAllGlobals();
});

const SECRET = "r".repeat(43);

function signedOut() {
  return new FakeApi()
    .on(readSession, () => session({ account: null }))
    .on(listSurveys, () => ({ surveys: [], installation: null }));
}

test("the way from the sign-in page asks for an address, and tells no more than that a mail may come", async () => {
  const api = signedOut()
    .on(requestReset, () => ({}))
    .install();
  renderApp("/sign-in");
  const user = userEvent.setup({ delay: null });
  await user.click(await screen.findByRole("link", { name: "Forgot the password" }));
  await user.click(await screen.findByRole("button", { name: "Send me a link" }));
  screen.getByText("Write the e-mail address of your account.");
  await user.type(screen.getByLabelText("E-mail"), "tom@example.org");
  await user.click(screen.getByRole("button", { name: "Send me a link" }));
  await screen.findByRole("heading", { level: 1, name: "Look into your mail." });
  expect(screen.getByRole("status").textContent).toMatch(/^If tom@example\.org has an account here, a link/);
  expect(api.named("requestReset").map(({ body }) => body)).toEqual([{ email: "tom@example.org" }]);
});

test("the link sets a password that is long enough, and goes in with it", async () => {
  const api = signedOut()
    .on(readReset, () => ({ email: "tom@example.org", expiresAt: "2031-05-02T10:00:00Z" }))
    .on(useReset, () => session())
    .install();
  const { router } = renderApp(`/reset/${SECRET}`);
  const user = userEvent.setup({ delay: null });
  await user.type(await screen.findByLabelText("New password"), "short");
  await user.click(screen.getByRole("button", { name: "Set the password and sign in" }));
  expect(api.named("useReset")).toEqual([]);
  await user.type(screen.getByLabelText("New password"), " and then longer");
  await user.click(screen.getByRole("button", { name: "Set the password and sign in" }));
  await waitFor(() => {
    expect(router.state.location.pathname).toBe("/surveys");
  });
  expect(api.named("useReset")[0]?.body).toEqual({ password: "short and then longer" });
});

test("an ended link leads to asking for a new one, also where a part of its address is missing", async () => {
  signedOut()
    .on(readReset, () => {
      throw new Problem("input-invalid", "secret is not the end of such a link");
    })
    .install();
  renderApp("/reset/cut-off");
  expect((await screen.findByRole("alert")).textContent).toContain("A part of the address is missing.");
  expect(screen.getByRole("link", { name: "Ask for a new link" }).getAttribute("href")).toBe("/reset");
});
