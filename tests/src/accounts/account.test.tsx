import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import { changeName, changePassword, endOtherSessions, endSession, listSessions } from "#shared/api/people.ts";
import { Problem } from "#shared/problem.ts";
import { browserWords } from "../../../src/features/accounts/browser-words.ts";
import { FakeApi } from "../app/fake-api.ts";
import { session } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

afterEach(() => {
  vi.unstubAllGlobals();
});

const ines = { id: "a1", name: "Ines Marrow", email: "ines@example.org", isOwner: false };
const FIREFOX = "Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0";
const PHONE =
  "Mozilla/5.0 (Linux; Android 14; K) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/131.0.0.0 Mobile Safari/537.36";

const at = (handle: string, userAgent: string, isThis: boolean) => ({
  handle: handle.repeat(64),
  startedAt: "2031-05-01T08:00:00Z",
  lastSeenAt: "2031-05-02T09:30:00Z",
  userAgent,
  isThis,
});

function signedIn(account = ines) {
  return new FakeApi()
    .on(readSession, () => session({ account }))
    .on(listSessions, () => ({ sessions: [at("a", FIREFOX, true), at("b", PHONE, false), at("c", "", false)] }));
}

// As the makers of the browsers document what theirs send.
test("a browser is told in words from how it names itself", () => {
  expect(browserWords(FIREFOX)).toBe("Firefox on Linux");
  expect(browserWords(PHONE)).toBe("Chrome on Android");
  expect(
    browserWords(
      "Mozilla/5.0 (iPhone; CPU iPhone OS 18_5 like Mac OS X) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/18.5 Mobile/15E148 Safari/604.1",
    ),
  ).toBe("Safari on an iPhone");
  expect(
    browserWords(
      "Mozilla/5.0 (Windows NT 10.0; Win64; x64) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/131.0.0.0 Safari/537.36 Edg/131.0.0.0",
    ),
  ).toBe("Edge on Windows");
  expect(browserWords("curl/8.14.1")).toBe("curl");
  expect(browserWords("")).toBe("a browser that does not say which");
});

test("a new name is in the header at once", async () => {
  const api = signedIn()
    .on(changeName, ({ body }) => ({ ...ines, name: body.name }))
    .install();
  renderApp("/account");
  const user = userEvent.setup({ delay: null });
  const field = await screen.findByLabelText("Name");
  await user.clear(field);
  await user.click(screen.getByRole("button", { name: "Change the name" }));
  screen.getByText("Write the name that the others will see.");
  await user.type(field, "Ines Marrow-Hale");
  await user.click(screen.getByRole("button", { name: "Change the name" }));
  await screen.findByRole("heading", { level: 1, name: "Ines Marrow-Hale" });
  screen.getByRole("button", { name: "Account of Ines Marrow-Hale" });
  expect(api.named("changeName").map(({ body }) => body)).toEqual([{ name: "Ines Marrow-Hale" }]);
});

test("a wrong present password is refused beside its field and nothing typed is lost; the right one empties both", async () => {
  signedIn()
    .on(changePassword, ({ body }) => {
      if (body.current !== "the one I use now") throw new Problem("password-wrong", "Try again.");
      return session();
    })
    .install();
  renderApp("/account");
  const user = userEvent.setup({ delay: null });
  await user.type(await screen.findByLabelText("Present password"), "not that one");
  await user.type(screen.getByLabelText("New password"), "another sentence");
  await user.click(screen.getByRole("button", { name: "Change the password" }));
  await screen.findByText("This is not the present password. Try again.");
  expect(screen.getByLabelText("Present password").getAttribute("aria-invalid")).toBe("true");
  screen.getByDisplayValue("another sentence");
  await user.clear(screen.getByLabelText("Present password"));
  await user.type(screen.getByLabelText("Present password"), "the one I use now");
  await user.click(screen.getByRole("button", { name: "Change the password" }));
  await waitFor(() => {
    expect(screen.getByLabelText<HTMLInputElement>("New password").value).toBe("");
  });
});

test("sessions are told with this one marked; one is ended, then all the others", async () => {
  const api = signedIn()
    .on(endSession, () => ({ sessions: [at("a", FIREFOX, true), at("c", "", false), at("d", "curl/8", false)] }))
    .on(endOtherSessions, () => ({ sessions: [at("a", FIREFOX, true)] }))
    .install();
  renderApp("/account");
  const user = userEvent.setup({ delay: null });
  const table = await screen.findByRole("table", { name: "Where you are signed in" });
  const own = within(table).getByRole("row", { name: /^Firefox on Linux now 1 May 2031 this browser$/ });
  expect(within(own).queryByRole("button")).toBeNull();
  await user.click(screen.getByRole("button", { name: /^End the session of Chrome on Android/ }));
  await waitFor(() => {
    expect(screen.queryByText("Chrome on Android")).toBeNull();
  });
  expect(api.named("endSession")[0]?.params).toEqual({ handle: "b".repeat(64) });
  await user.click(screen.getByRole("button", { name: "End all the others" }));
  await screen.findByText("You are signed in nowhere else.");
});

test("an owner finds the way to the installation, others don't", async () => {
  signedIn({ ...ines, isOwner: true }).install();
  renderApp("/account");
  const link = await screen.findByRole("link", { name: "To the installation" });
  expect(link.getAttribute("href")).toBe("/installation");
});
