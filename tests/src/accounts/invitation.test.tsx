import { screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import { acceptInvitation, readInvitation, type InvitationSeen } from "#shared/api/people.ts";
import { listAreas } from "#shared/api/area.ts";
import { listSurveys, readSurvey } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import { FakeApi } from "../app/fake-api.ts";
import { listed, session, survey } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

afterEach(() => {
  vi.unstubAllGlobals();
});

const SECRET = "s".repeat(43);
const tom = { id: "a2", name: "Tom Ashby", email: "tom@example.org", isOwner: false };

function invitation(part: Partial<InvitationSeen> = {}): InvitationSeen {
  return {
    email: "tom@example.org",
    survey: "Pellimere Fen",
    role: "counter",
    makesOwner: false,
    invitedBy: "Ines Marrow",
    expiresAt: "2031-05-16T08:00:00Z",
    hasAccount: false,
    keyFingerprint: "ab".repeat(32),
    ...part,
  };
}

/** A link that invites to this, at a browser where nobody is signed in unless `signedIn` says who. */
function invited(part: Partial<InvitationSeen> = {}, signedIn: typeof tom | null = null) {
  return new FakeApi()
    .on(readSession, () => session({ account: signedIn }))
    .on(readInvitation, () => invitation(part))
    .on(readSurvey, () => survey(["planner"]))
    .on(listAreas, () => ({ areas: [] }));
}

test("the page says who invites to what, what the role does, and until when", async () => {
  invited().install();
  renderApp(`/invitation/${SECRET}`);
  await screen.findByRole("heading", { level: 1, name: "Ines Marrow invites you to Pellimere Fen, as counter." });
  screen.getByText("Sees and counts the cells that are given to them.");
  screen.getByText(/works once, until 16 May 2031, 08:00 UTC/);
  screen.getByText(/at least 12 characters.*common ones is refused/);
  expect(screen.queryByText(/fingerprint/)).toBeNull();
});

test("a name and a long password make the account, and lead to the stage that waits for the role", async () => {
  const waiting = listed(["planner"], {
    waiting: [
      { kind: "invitations", role: "planner", open: 1, expired: 1 },
      { kind: "sealing", role: "planner", draft: null },
    ],
  });
  const api = invited({ role: "planner" })
    .on(acceptInvitation, () => ({ session: session({ account: tom }), surveyId: "s1" }))
    .on(listSurveys, () => ({ surveys: [listed(["auditor"], { id: "s0" }), waiting], installation: null }))
    .install();
  const { router } = renderApp(`/invitation/${SECRET}`);
  const user = userEvent.setup({ delay: null });
  await user.click(await screen.findByRole("button", { name: "Take part as planner" }));
  screen.getByText("Write the name that the others will see.");
  expect(document.activeElement).toBe(screen.getByLabelText("Your name"));
  await user.type(screen.getByLabelText("Your name"), " Tom Ashby ");
  await user.type(screen.getByLabelText("Password"), "eleven char");
  await user.click(screen.getByRole("button", { name: "Take part as planner" }));
  expect(document.activeElement).toBe(screen.getByLabelText("Password"));
  expect(api.named("acceptInvitation")).toEqual([]);
  await user.type(screen.getByLabelText("Password"), "s");
  await user.click(screen.getByRole("button", { name: "Take part as planner" }));
  await waitFor(() => {
    expect(router.state.location.pathname).toBe("/surveys/s1/frame");
  });
  expect(api.named("acceptInvitation")[0]?.body).toEqual({ name: "Tom Ashby", password: "eleven chars" });
});

test("a common password is refused beside its field and everything typed stays", async () => {
  invited()
    .on(acceptInvitation, () => {
      throw new Problem("password-common", "Choose another one.");
    })
    .install();
  renderApp(`/invitation/${SECRET}`);
  const user = userEvent.setup({ delay: null });
  await user.type(await screen.findByLabelText("Your name"), "Tom Ashby");
  await user.type(screen.getByLabelText("Password"), "password1234");
  await user.click(screen.getByRole("button", { name: "Take part as counter" }));
  const alert = await screen.findByRole("alert");
  expect(alert.textContent).toBe("This password is one of the first that are tried. Choose another one.");
  expect(screen.getByLabelText("Password").getAttribute("aria-describedby")).toBe(alert.id);
  screen.getByDisplayValue("Tom Ashby");
  screen.getByDisplayValue("password1234");
});

test("an address that has an account is asked for its password only", async () => {
  const api = invited({ hasAccount: true })
    .on(acceptInvitation, () => ({ session: session({ account: tom }), surveyId: null }))
    .on(listSurveys, () => ({ surveys: [], installation: null }))
    .install();
  const { router } = renderApp(`/invitation/${SECRET}`);
  const user = userEvent.setup({ delay: null });
  await user.type(await screen.findByLabelText("Password"), "short");
  expect(screen.queryByLabelText("Your name")).toBeNull();
  await user.click(screen.getByRole("button", { name: "Take part as counter" }));
  await waitFor(() => {
    expect(router.state.location.pathname).toBe("/surveys");
  });
  expect(api.named("acceptInvitation")[0]?.body).toEqual({ password: "short" });
});

test("where somebody else is signed in, the page says that accepting ends their session", async () => {
  invited({}, { ...tom, id: "a1", name: "Ines Marrow", email: "ines@example.org" }).install();
  renderApp(`/invitation/${SECRET}`);
  await screen.findByText(/Ines Marrow is signed in at this browser\. Accepting ends that session/);
});

test("an auditor finds the key's fingerprint with the word to keep it", async () => {
  invited({ role: "auditor" }).install();
  renderApp(`/invitation/${SECRET}`);
  await screen.findByRole("heading", { name: "Keep this outside of here" });
  expect(screen.getAllByText("abab")).toHaveLength(16);
});

test("a link that has ended says whom to ask, and offers to sign in", async () => {
  invited()
    .on(readInvitation, () => {
      throw new Problem("link-ended", "It has expired. Ask whoever invited you for a new one.");
    })
    .install();
  renderApp(`/invitation/${SECRET}`);
  await screen.findByRole("heading", { level: 1, name: "This invitation has ended." });
  expect(screen.getByRole("alert").textContent).toContain("Ask whoever invited you for a new one.");
  expect(screen.getByRole("link", { name: "Sign in" }).getAttribute("href")).toBe("/sign-in");
});
