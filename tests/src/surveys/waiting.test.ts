import { expect, test } from "vitest";
import type { WaitingThing } from "#shared/api/waiting.ts";
import { waitingForOwners, waitingIn, waitingLead, waitingTitle } from "../../../src/app/waiting.ts";
import { listed } from "../app/fixtures.ts";

const of = (...waiting: WaitingThing[]) => waitingIn([listed(["planner"], { waiting })]);
const at = "2031-05-02T08:00:00Z";

test("each thing that waits is a sentence with its next step, and leads to the page where it is done", () => {
  const things: WaitingThing[] = [
    { kind: "boundary", role: "planner" },
    { kind: "sealing", role: "planner", draft: 2 },
    { kind: "declaring", role: "planner", withdrawn: null },
    { kind: "not-shared-out", role: "lead", cells: 7, of: 10 },
    { kind: "all-counted", role: "lead", cells: 10 },
    { kind: "invitations", role: "planner", open: 3, expired: 0 },
  ];
  expect(of(...things).map(({ role, fact, to }) => [role, fact, to])).toEqual([
    ["planner", "There is no study area yet.", "/surveys/s1/area"],
    ["planner", "Frame version 2 is not sealed.", "/surveys/s1/frame"],
    ["planner", "No cells are drawn yet.", "/surveys/s1/draw"],
    ["lead", "7 of 10 cells are in nobody’s list.", "/surveys/s1/field"],
    ["lead", "All 10 cells are counted.", "/surveys/s1/estimate"],
    ["planner", "Three people are invited and not here yet.", "/surveys/s1/people"],
  ]);
});

test("what needs attention comes first, whichever survey it is of", () => {
  const items = waitingIn([
    listed(["planner"], { waiting: [{ kind: "boundary", role: "planner" }] }),
    listed(["lead"], { id: "s2", name: "Hobb Warren", waiting: [{ kind: "closing", role: "lead", cells: 2 }] }),
    listed(["planner"], {
      id: "s3",
      waiting: [
        { kind: "drawing", role: "planner", declaredAt: at, seedGiven: false },
        { kind: "declaring", role: "planner", withdrawn: 4 },
        { kind: "invitations", role: "planner", open: 1, expired: 2 },
        { kind: "estimate-older", role: "planner", keptAt: at },
      ],
    }),
  ]);
  expect(items.map(({ fact }) => fact)).toEqual([
    "Two cells were reported and not counted.",
    "A draw is declared, and its seed is not drawn.",
    "Draw 4 is withdrawn, and nothing was declared since.",
    "Two invitations have expired.",
    "Counts came in after the estimate was kept.",
    "There is no study area yet.",
  ]);
  expect(items[1]?.next).toContain("Declared on 2 May 2031, 08:00 UTC.");
  expect(items[3]?.next).toBe("Send a new link, or withdraw it. One more is open.");
});

test("a counter reads of their own cells, with the days as the lead wrote them", () => {
  const days = [
    { day: "Friday", cells: 2 },
    { day: "", cells: 1 },
  ];
  const [item] = of({ kind: "own-cells", role: "counter", cells: 3, of: 4, days });
  expect(item).toMatchObject({ fact: "3 of your 4 cells are not visited yet.", to: "/surveys/s1/counts" });
  expect(item?.next).toContain("2 for Friday and 1 without a day.");
  const [none] = of({ kind: "own-cells", role: "counter", cells: 4, of: 4, days });
  expect(none?.fact).toBe("None of your 4 cells is visited yet.");
});

test("an auditor gets the newest hash with the event that it is of", () => {
  const sha256 = "ab".repeat(32);
  const [item] = of({ kind: "newest-hash", role: "auditor", because: "drawn", at, sequence: 12, sha256 });
  expect(item).toMatchObject({ fact: "Cells were drawn on 2 May 2031: keep the newest hash.", hash: sha256 });
  expect(item?.next).toContain("Of event 12.");
});

test("an owner is led to the part of the installation that waits; kept mails are told once none has failed", () => {
  const none = { mailsFailed: 0, mailsKept: 0, publicAddressMissing: false, backupError: null };
  expect(waitingForOwners(null)).toEqual([]);
  expect(waitingForOwners(none)).toEqual([]);
  expect(waitingForOwners({ ...none, mailsKept: 2 }).map(({ fact, to }) => [fact, to])).toEqual([
    ["Two mails are kept here.", "/installation#mails"],
  ]);
  const all = waitingForOwners({ mailsFailed: 1, mailsKept: 2, publicAddressMissing: true, backupError: "disk full" });
  expect(all.map(({ state, fact, to }) => [state, fact, to])).toEqual([
    ["attention", "The last daily copy was not made.", "/installation#storage"],
    ["attention", "One mail could not be sent.", "/installation#mails"],
    ["not-started", "No public address is set.", "/installation#address"],
  ]);
});

test("the page opens with how many things wait, and how many of them need attention", () => {
  expect(waitingTitle(0)).toBe("Nothing waits for you.");
  expect(waitingTitle(1)).toBe("One thing waits for you.");
  expect(waitingTitle(3)).toBe("Three things wait for you.");
  expect(waitingTitle(14)).toBe("14 things wait for you.");
  expect(waitingLead(of({ kind: "closing", role: "lead", cells: 1 }, { kind: "boundary", role: "planner" }))).toBe(
    "One needs attention and stands first.",
  );
});
