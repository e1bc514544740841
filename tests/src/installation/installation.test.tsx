import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import {
  changeAccount,
  changeInstallationSettings,
  inviteAccount,
  listAccounts,
  listMails,
  readInstallation,
  readMail,
  sendMailAgain,
  sendReset,
  withdrawAccountInvitation,
} from "#shared/api/installation.ts";
import { Problem } from "#shared/problem.ts";
import { session } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";
import { failed, ines, installation, ownersApi, tom } from "./fixtures.ts";

// jsdom has no canvas and scrolls nowhere.
beforeEach(() => {
  vi.spyOn(HTMLCanvasElement.prototype, "getContext").mockReturnValue(null);
  Element.prototype.scrollIntoView = vi.fn();
});
afterEach(() => {
  vi.unstubAllGlobals();
});

const user = () => userEvent.setup({ delay: null });

test("who is no owner is told so and asks the server for nothing of it; their menu has no link to it", async () => {
  const api = ownersApi()
    .on(readSession, () => session())
    .install();
  renderApp("/installation");
  await screen.findByText("This page is for owners of the installation.");
  expect(api.named("readInstallation")).toEqual([]);
  await user().click(screen.getByRole("button", { name: "Account of Ines Marrow" }));
  expect(screen.queryByRole("menuitem", { name: "Installation" })).toBeNull();
});

test("an owner finds the page in the menu of the account, with its six parts", async () => {
  ownersApi().install();
  renderApp("/installation");
  const parts = ["Accounts", "Mails", "Storage and backups", "Map", "Address", "Version and key"];
  for (const name of parts) await screen.findByRole("heading", { name, level: 2 });
  await user().click(screen.getByRole("button", { name: "Account of Ines Marrow" }));
  expect(screen.getByRole("menuitem", { name: "Installation" }).getAttribute("href")).toBe("/installation");
  // One primary act: settings are kept by it, and nothing is changed yet.
  expect(screen.getByRole<HTMLButtonElement>("button", { name: "Keep map and address", hidden: true }).disabled).toBe(
    true,
  );
});

test("closing an account says what follows, is done by a second press, and a refusal stays in the dialog", async () => {
  let mayClose = false;
  const api = ownersApi()
    .on(changeAccount, ({ body }) => {
      if (!mayClose) throw new Problem("last-owner", "Make somebody else an owner first.");
      const closedAt = body.closed ? "2031-05-02T09:00:00Z" : null;
      return { accounts: [ines, { ...tom, closedAt }], invitations: [] };
    })
    .install();
  renderApp("/installation");
  const press = user();
  await press.click(await screen.findByRole("button", { name: "Change Tom Ashby" }));
  await press.click(screen.getByRole("menuitem", { name: "Close the account…" }));
  const dialog = await screen.findByRole("dialog", { name: "Close the account of Tom Ashby?" });
  expect(dialog.textContent).toContain("All sessions end at once");
  expect(api.named("changeAccount")).toEqual([]);
  await press.click(within(dialog).getByRole("button", { name: "Close the account" }));
  expect((await within(dialog).findByRole("alert")).textContent).toContain("Make somebody else an owner first.");
  mayClose = true;
  await press.click(within(dialog).getByRole("button", { name: "Close the account" }));
  await screen.findByText("closed since 2 May 2031");
  expect(api.named("changeAccount").at(-1)).toMatchObject({
    params: { accountId: "a2" },
    body: { isOwner: false, closed: true, seen: { isOwner: false, closed: false } },
  });
  await press.click(screen.getByRole("button", { name: "Change Tom Ashby" }));
  await press.click(screen.getByRole("menuitem", { name: "Open the account again" }));
  await waitFor(() => {
    expect(screen.queryByText("closed since 2 May 2031")).toBeNull();
  });
});

test("a link for a new password is sent by name, and who is invited can be withdrawn", async () => {
  const invitation = {
    id: "i1",
    email: "new@example.org",
    survey: null,
    makesOwner: true,
    expiresAt: "2031-05-16T08:00:00Z",
    expired: false,
  };
  const api = ownersApi()
    .on(sendReset, () => ({}))
    .on(inviteAccount, () => ({ accounts: [ines, tom], invitations: [invitation] }))
    .on(withdrawAccountInvitation, () => ({ accounts: [ines, tom], invitations: [] }))
    .install();
  renderApp("/installation");
  const press = user();
  await press.click(await screen.findByRole("button", { name: "Change Tom Ashby" }));
  await press.click(screen.getByRole("menuitem", { name: "Send a link for a new password" }));
  await waitFor(() => {
    expect(api.named("sendReset")[0]?.params).toEqual({ accountId: "a2" });
  });
  await press.click(screen.getByRole("button", { name: "Invite to the installation" }));
  screen.getByText("Write the e-mail address of the person.");
  await press.type(screen.getByLabelText("Invite by e-mail"), "new@example.org");
  await press.click(screen.getByLabelText("As an owner of the installation"));
  await press.click(screen.getByRole("button", { name: "Invite to the installation" }));
  await screen.findByText("the installation, as owner");
  expect(api.named("inviteAccount")[0]?.body).toEqual({ email: "new@example.org", makesOwner: true });
  screen.getByText("works until 16 May 2031");
  await press.click(screen.getByRole("button", { name: "Withdraw the invitation of new@example.org" }));
  await waitFor(() => {
    expect(screen.queryByText("works until 16 May 2031")).toBeNull();
  });
});

test("a failed mail is read with what the server said, forwarded by one's own mail program, or sent again", async () => {
  const mail = { ...failed, text: "Ines Marrow invites you.\nPress: https://x", emptied: false };
  const api = ownersApi()
    .on(readMail, () => mail)
    .on(sendMailAgain, () => ({ ...mail, state: "waiting" as const }))
    .install();
  renderApp("/installation");
  const press = user();
  await screen.findByText("failed after 5 attempts");
  await press.click(screen.getByRole("button", { name: "An invitation to Pellimere Fen" }));
  const dialog = await screen.findByRole("dialog", { name: "An invitation to Pellimere Fen" });
  await within(dialog).findByText("550 no such mailbox");
  const forward = within(dialog).getByRole("link", { name: "Open in your mail program" }).getAttribute("href");
  expect(forward).toBe(
    "mailto:tom@example.org?subject=An%20invitation%20to%20Pellimere%20Fen&body=Ines%20Marrow%20invites%20you.%0APress%3A%20https%3A%2F%2Fx",
  );
  await press.click(within(dialog).getByRole("button", { name: "Try to send it again" }));
  await waitFor(() => {
    expect(api.named("sendMailAgain")).toHaveLength(1);
  });
});

test("a mail whose link has ended has no text to forward", async () => {
  ownersApi()
    .on(readMail, () => ({ ...failed, text: "", emptied: true }))
    .install();
  renderApp("/installation");
  await userEvent.click(await screen.findByRole("button", { name: "An invitation to Pellimere Fen" }));
  const dialog = await screen.findByRole("dialog");
  await within(dialog).findByText(/Its text is gone/);
  expect(within(dialog).queryByRole("link")).toBeNull();
  expect(within(dialog).queryByRole("button", { name: "Try to send it again" })).toBeNull();
});

test("without a mail server the page says that mails are kept here and how one is set up", async () => {
  const mail = { server: null, from: null, waiting: 0, failed: 0, kept: 1 };
  const api = ownersApi()
    .on(readInstallation, () => installation({ mail }))
    .on(listMails, ({ query }) => ({
      mails: query["state"] === "sent" ? [] : [{ ...failed, state: "kept" as const }],
      more: false,
    }))
    .install();
  renderApp("/installation");
  await screen.findByText("No mail server is set up: mails are kept here.");
  expect(screen.getByLabelText("settings of the mail server").textContent).toContain("QUILLET_SMTP_URL=");
  await screen.findByText("kept here");
  await userEvent.click(screen.getByRole("radio", { name: "Sent" }));
  await screen.findByText("No mail was sent yet.");
  expect(api.named("listMails").at(-1)?.query).toEqual({ state: "sent" });
});

test("storage tells what is stored, what is kept, what went wrong, and how a copy is put back", async () => {
  const backups = { ...installation().backups, lastError: "2031-05-02T02:00:00Z: the disk is full" };
  ownersApi()
    .on(readInstallation, () => installation({ backups }))
    .install();
  renderApp("/installation");
  await screen.findByText("41.0 MB", { normalizer: (text) => text.replaceAll("\u00a0", " ") });
  screen.getByText(/the disk is full/);
  screen.getByText(/Those of the last 14 days are kept, and the first of each month for a year/);
  within(screen.getByRole("table", { name: "Daily copies, newest first" })).getByText("quillet-2031-05-02.backup");
  expect(screen.getByLabelText("commands to restore").textContent).toContain("restore quillet.backup");
});

test("a base map needs {z}, {x}, {y} and a name; nothing is fetched before there is one, and its preview names it", async () => {
  const api = ownersApi()
    .on(changeInstallationSettings, ({ body }) => body)
    .install();
  renderApp("/installation");
  const press = user();
  await press.click(await screen.findByRole("radio", { name: /Pictures from a map server/ }));
  expect(document.querySelectorAll(".q-base-map")).toHaveLength(0);
  await press.type(screen.getByLabelText("XYZ template"), "https://tiles.example.org/map.png");
  await press.click(screen.getByRole("button", { name: "Keep map and address" }));
  screen.getByText(/Write an address that holds/);
  screen.getByText("Write whom the map’s makers want to be named.");
  expect(api.named("changeInstallationSettings")).toEqual([]);
  await press.clear(screen.getByLabelText("XYZ template"));
  await press.type(screen.getByLabelText("XYZ template"), "https://tiles.example.org/{{z}/{{x}/{{y}.png");
  await press.type(screen.getByLabelText("Attribution"), "Example Survey");
  const preview = await screen.findByRole("figure", { name: "Preview of the base map" });
  await within(preview).findByText("Base map: Example Survey");
  await waitFor(() => {
    expect(preview.querySelectorAll(".q-base-map > img").length).toBeGreaterThan(0);
  });
  await press.type(screen.getByLabelText(/Public address/), "https://surveys.example.org");
  await press.click(screen.getByRole("button", { name: "Keep map and address" }));
  await waitFor(() => {
    expect(api.named("changeInstallationSettings")[0]?.body).toEqual({
      publicAddress: "https://surveys.example.org",
      baseMap: { url: "https://tiles.example.org/{z}/{x}/{y}.png", attribution: "Example Survey" },
    });
  });
  await screen.findByText("Nothing is changed.");
});

test("settings that another owner changed meanwhile are shown beside one's own, and what is chosen is kept", async () => {
  const theirs = { publicAddress: "https://theirs.example.org", baseMap: null };
  let refused = false;
  const api = ownersApi()
    .on(changeInstallationSettings, ({ body }) => {
      if (refused) return body;
      refused = true;
      const question = { kind: "versions", current: theirs, version: '"two"' } as const;
      throw new Problem("changed-meanwhile", "Look at both versions.", question);
    })
    .install();
  renderApp("/installation");
  const press = user();
  await press.type(await screen.findByLabelText(/Public address/), "https://mine.example.org");
  await press.click(screen.getByRole("button", { name: "Keep map and address" }));
  await screen.findByRole("heading", { name: "Both versions" });
  screen.getByText("https://theirs.example.org");
  await press.click(screen.getByRole("radio", { name: /Keep mine/ }));
  await press.click(screen.getByRole("button", { name: "Keep these settings" }));
  await waitFor(() => {
    expect(api.named("changeInstallationSettings")).toHaveLength(2);
  });
  expect(api.named("changeInstallationSettings")[1]?.body).toEqual({
    publicAddress: "https://mine.example.org",
    baseMap: null,
  });
  await waitFor(() => {
    expect(screen.queryByRole("heading", { name: "Both versions" })).toBeNull();
  });
});

test("accounts that can't be loaded are refused with a way to try again, and the rest of the page stands", async () => {
  ownersApi()
    .on(listAccounts, () => {
      throw new Problem("internal", "Try again.");
    })
    .install();
  renderApp("/installation");
  await screen.findByRole("heading", { name: "Mails", level: 2 });
  await screen.findByRole("button", { name: "Try again" });
});
