import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import type { Role } from "#shared/access/table.ts";
import { readSession } from "#shared/api/accounts.ts";
import {
  addPerson,
  leaveSurvey,
  listPeople,
  renewInvitation,
  setRoles,
  withdrawInvitation,
  type Invitation,
  type Member,
  type People,
} from "#shared/api/people.ts";
import { listSurveys, readSurvey, type Survey } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import { FakeApi } from "../app/fake-api.ts";
import { session, survey } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

afterEach(() => {
  vi.unstubAllGlobals();
});

function member(part: Partial<Member>): Member {
  return {
    id: "m1",
    name: "Ines Marrow",
    email: "ines@example.org",
    roles: ["planner"],
    addedAt: "2031-05-02T08:00:00Z",
    isSelf: false,
    isClosed: false,
    ...part,
  };
}
const ines = member({ isSelf: true });
const tom = member({ id: "m2", name: "Tom Ashby", email: "tom@example.org", roles: ["lead", "counter"] });

const invitation: Invitation = {
  id: "i1",
  email: "ada@example.org",
  role: "auditor",
  invitedBy: "Ines Marrow",
  createdAt: "2031-05-02T08:00:00Z",
  expiresAt: "2031-05-16T08:00:00Z",
  expired: false,
  mail: "sent",
};

interface Situation {
  readonly roles?: Role[];
  readonly survey?: Partial<Survey>;
  readonly members?: readonly Member[];
  readonly invitations?: readonly Invitation[];
}

/** As the server has them; acts change it. */
let now: People = { members: [], invitations: [] };
const become = (members: readonly Member[], invitations: readonly Invitation[] = []): People => {
  now = { members: [...members], invitations: [...invitations] };
  return now;
};

function peopleOf({ roles = ["planner"], survey: part, members = [ines, tom], invitations = [] }: Situation = {}) {
  become(members, invitations);
  return new FakeApi()
    .on(readSession, () => session())
    .on(readSurvey, () => survey(roles, part))
    .on(listSurveys, () => ({ surveys: [], installation: null }))
    .on(listPeople, () => now);
}

const open = () => renderApp("/surveys/s1/people");

test("an address is added at once or by an invitation, the page says so beforehand, and the list shows which it was", async () => {
  const kept: Invitation = { ...invitation, email: "new@example.org", role: "lead", mail: "kept" };
  const api = peopleOf()
    .on(addPerson, () => become([ines, tom], [kept]))
    .install();
  open();
  const user = userEvent.setup({ delay: null });
  await screen.findByText(/holds the role at once.*Anybody else is invited/);
  await user.click(screen.getByRole("button", { name: "Add to the survey" }));
  screen.getByText("Write the e-mail address of the person.");
  await user.type(screen.getByLabelText("E-mail"), "New@example.org");
  await user.click(screen.getByRole("radio", { name: /^Lead/ }));
  await user.click(screen.getByRole("button", { name: "Add to the survey" }));
  const table = await screen.findByRole("table", { name: "Invitations that nobody has accepted yet" });
  within(table).getByRole("row", { name: /^new@example\.org lead kept here 16 May 2031/ });
  screen.getByText(/the owner of this installation finds it under Mails/);
  expect(api.named("addPerson").map(({ body }) => body)).toEqual([{ email: "new@example.org", role: "lead" }]);
  expect(screen.getByLabelText<HTMLInputElement>("E-mail").value).toBe("");
});

test("an expired invitation says so, is renewed, and withdrawn", async () => {
  const expired = { ...invitation, expired: true };
  const api = peopleOf({ invitations: [expired] })
    .on(renewInvitation, () => become([ines, tom], [invitation]))
    .on(withdrawInvitation, () => become([ines, tom]))
    .install();
  open();
  const user = userEvent.setup({ delay: null });
  await screen.findByText("expired on 16 May 2031");
  await user.click(screen.getByRole("button", { name: "Send ada@example.org a new link as auditor" }));
  await waitFor(() => {
    expect(screen.queryByText(/expired/)).toBeNull();
  });
  await user.click(screen.getByRole("button", { name: "Withdraw the invitation of ada@example.org as auditor" }));
  await waitFor(() => {
    expect(screen.queryByRole("heading", { name: "Invited" })).toBeNull();
  });
  for (const name of ["renewInvitation", "withdrawInvitation"]) {
    expect(api.named(name)[0]?.params).toEqual({ surveyId: "s1", invitationId: "i1" });
  }
});

test("roles are changed together, at least one is kept, and the last planner stays one", async () => {
  const api = peopleOf()
    .on(setRoles, () => become([ines, { ...tom, roles: ["planner", "lead"] }]))
    .install();
  open();
  const user = userEvent.setup({ delay: null });
  await user.click(await screen.findByRole("button", { name: "Change the roles of Ines Marrow…" }));
  expect(screen.getByRole<HTMLInputElement>("checkbox", { name: "Planner" }).disabled).toBe(true);
  await user.click(screen.getByRole("button", { name: "Leave them as they are" }));
  await user.click(screen.getByRole("button", { name: "Change the roles of Tom Ashby…" }));
  const keep = screen.getByRole<HTMLButtonElement>("button", { name: "Change the roles" });
  expect(keep.disabled).toBe(true);
  await user.click(screen.getByRole("checkbox", { name: "Counter" }));
  await user.click(screen.getByRole("checkbox", { name: "Lead" }));
  screen.getByText(/Choose at least one role/);
  expect(keep.disabled).toBe(true);
  await user.click(screen.getByRole("checkbox", { name: "Lead" }));
  await user.click(screen.getByRole("checkbox", { name: "Planner" }));
  await user.click(keep);
  await screen.findByRole("cell", { name: "planner and lead" });
  expect(api.named("setRoles").map(({ params, body }) => ({ params, body }))).toEqual([
    { params: { surveyId: "s1", memberId: "m2" }, body: { roles: ["planner", "lead"], seen: ["lead", "counter"] } },
  ]);
});

test("removing says that access ends at once and what stays on record, and is done only when confirmed", async () => {
  const api = peopleOf()
    .on(setRoles, () => become([ines]))
    .install();
  open();
  const user = userEvent.setup({ delay: null });
  await user.click(await screen.findByRole("button", { name: "Remove Tom Ashby…" }));
  const dialog = screen.getByRole("dialog", { name: "Remove Tom Ashby?" });
  expect(dialog.textContent).toMatch(/at once.*signed out everywhere.*stays on record/);
  expect(api.named("setRoles")).toEqual([]);
  await user.click(within(dialog).getByRole("button", { name: "Remove Tom Ashby" }));
  await waitFor(() => {
    expect(screen.queryByText("Tom Ashby")).toBeNull();
  });
  expect(api.named("setRoles")[0]?.body).toEqual({ roles: [], seen: ["lead", "counter"] });
});

test("the last planner can't leave and is told why", async () => {
  peopleOf().install();
  open();
  expect((await screen.findByRole<HTMLButtonElement>("button", { name: "Leave the survey…" })).disabled).toBe(true);
  screen.getByText("You are its last planner: make somebody else a planner first.");
  expect(screen.queryByRole("button", { name: "Remove Ines Marrow…" })).toBeNull();
});

test("one of two planners leaves after a question, and a refusal keeps them in", async () => {
  let refuses = true;
  peopleOf({ members: [ines, { ...tom, roles: ["planner"] }] })
    .on(leaveSurvey, () => {
      if (refuses) throw new Problem("last-planner", "Make somebody else a planner first.");
      return {};
    })
    .install();
  const { router } = open();
  const user = userEvent.setup({ delay: null });
  await user.click(await screen.findByRole("button", { name: "Leave the survey…" }));
  const dialog = screen.getByRole("dialog", { name: "Leave Pellimere Fen?" });
  await user.click(within(dialog).getByRole("button", { name: "Leave the survey" }));
  expect((await within(dialog).findByRole("alert")).textContent).toContain("A survey needs a planner.");
  refuses = false;
  await user.click(within(dialog).getByRole("button", { name: "Leave the survey" }));
  await waitFor(() => {
    expect(router.state.location.pathname).toBe("/surveys");
  });
});

test("who may not change people sees them and no form", async () => {
  peopleOf({
    roles: ["lead"],
    members: [{ ...ines, isSelf: false, isClosed: true }],
    invitations: [invitation],
  }).install();
  open();
  await screen.findByText("ines@example.org");
  screen.getByText("(account closed)");
  for (const name of [/^Add to/, /^Change the roles/, /^Remove/, /new link/, /^Withdraw/]) {
    expect(screen.queryByRole("button", { name })).toBeNull();
  }
});

test("a counter sees no list of people, only their own part and the way out of it", async () => {
  const api = peopleOf({ roles: ["counter"] }).install();
  open();
  await screen.findByRole("heading", { level: 1, name: "You are counter of Pellimere Fen." });
  screen.getByRole("button", { name: "Leave the survey…" });
  expect(screen.getAllByRole("link", { name: "Your part" })[0]?.getAttribute("aria-current")).toBe("page");
  expect(api.named("listPeople")).toEqual([]);
});

test("an archived survey keeps its people as they are", async () => {
  peopleOf({ survey: { archivedAt: "2032-01-01T00:00:00Z" }, invitations: [invitation] }).install();
  open();
  await screen.findByText("This survey is archived: its people stay as they are.");
  expect(screen.queryByRole("button", { name: /^(Add|Remove|Withdraw|Leave)/ })).toBeNull();
});

test("an owner of the installation reaches the people of a survey without a role in it", async () => {
  const account = { id: "a1", name: "Ines Marrow", email: "ines@example.org", isOwner: true };
  peopleOf({ members: [tom], invitations: [{ ...invitation, mail: "kept" }] })
    .on(readSession, () => session({ account }))
    .on(readSurvey, () => {
      throw new Problem("survey-not-found", "Check the address.");
    })
    .install();
  open();
  await screen.findByText("1 person in this survey, 1 invitation waiting for an answer.");
  screen.getByRole("button", { name: "Add to the survey" });
  expect(screen.getByRole("link", { name: "look at the mails." }).getAttribute("href")).toBe("/installation#mails");
  expect(screen.queryByRole("button", { name: "Leave the survey…" })).toBeNull();
});
