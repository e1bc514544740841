import { screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import { listEvents, type RecordEvent } from "#shared/api/record.ts";
import { readSurvey } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import { FakeApi } from "../app/fake-api.ts";
import { session, survey } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

afterEach(() => {
  vi.unstubAllGlobals();
});

const hash = (n: number) => String(n).padStart(2, "0").repeat(32);

function event(sequence: number, kind: string, payload: Record<string, unknown>, by = "Ines Marrow"): RecordEvent {
  const at = `2031-05-${String(sequence).padStart(2, "0")}T09:12:00Z`;
  return { sequence, at, kind, memberId: by, by, sha256: hash(sequence), payload: { version: 1, ...payload } };
}

function count(sequence: number, unit: number, value: number, by: string): RecordEvent {
  const one = event(
    sequence,
    "count-entered",
    {
      entryId: `e${sequence}`,
      visitId: `v${unit}`,
      frameId: "f1",
      unit,
      targetId: "t1",
      observer: "m1",
      purpose: "first",
      state: "counted",
      value,
      replaces: null,
      reason: "",
      note: "",
      madeAt: "2031-05-20T09:00:00Z",
      importId: null,
    },
    by,
  );
  return { ...one, at: `2031-05-20T09:${String(sequence).padStart(2, "0")}:00Z` };
}

/** Newest first, two a page. */
function open(events: readonly RecordEvent[], page = 50) {
  const api = new FakeApi()
    .on(readSession, () => session())
    .on(readSurvey, () => survey(["auditor"]))
    .on(listEvents, ({ query }) => {
      const before = query["before"] === undefined ? Infinity : Number(query["before"]);
      const rest = events.filter(({ sequence }) => sequence < before);
      return {
        events: rest.slice(0, page),
        newest: { sequence: events[0]?.sequence ?? 0, sha256: events[0]?.sha256 ?? hash(0) },
        keyFingerprint: "fe".repeat(32),
        elsewhere: { sameSource: 0, sameFrame: 0 },
        more: rest.length > page,
      };
    });
  return api;
}

test("each event is a sentence with its number and hash, newest first", async () => {
  open([
    event(3, "draw-withdrawn", { drawId: "d1", reason: "Wrong boundary." }),
    event(2, "area-imported", {}),
    event(1, "quillet-9-event", {}),
  ]).install();
  renderApp("/surveys/s1/record");
  await screen.findByRole("heading", { level: 1, name: "3 events in one unbroken chain." });
  const line = within(screen.getByRole("list", { name: "Events, newest first" }));
  const [withdrawn] = line.getAllByText("A draw was withdrawn");
  expect(withdrawn?.closest("li")?.textContent).toContain("“Wrong boundary.” Ines Marrow. Its picks stay on record.");
  line.getByRole("button", { name: `Copy hash of event 3: ${hash(3)}` });
  // One whose content was left out, and one of a kind that is not known here, are told all the same.
  line.getByText("An event whose content was left out.");
  line.getByText("An event of a later version.");
});

test("counts by one person in one go are one line, each of them a fold away; another person's are their own", async () => {
  open([count(4, 9, 2, "Tom Reed"), count(3, 8, 0, "Ines Marrow"), count(2, 7, 5, "Ines Marrow")]).install();
  renderApp("/surveys/s1/record");
  await screen.findByText("2 cells written down");
  screen.getByText("Unit 9: 2");
  screen.getByText("events 2 to 3");
  screen.getByText("Unit 8: 0");
  screen.getByText("Unit 7: 5");
});

test("the newest hash stands whole in the margin, and the record file is one press away", async () => {
  open([event(1, "draw-withdrawn", { drawId: "d1", reason: "Wrong." })]).install();
  renderApp("/surveys/s1/record");
  await screen.findByRole("heading", { level: 1, name: "1 event in one unbroken chain." });
  screen.getByRole("button", { name: `Copy newest hash: ${hash(1)}` });
  expect(document.querySelector(".q-hash-block")?.textContent).toBe(hash(1));
  const save = screen.getByRole("link", { name: "Save the record file" });
  expect(save.getAttribute("href")).toBe("/api/surveys/s1/record");
  expect(save.hasAttribute("download")).toBe(true);
  expect(screen.getByRole("link", { name: "Open replay" }).getAttribute("href")).toBe("/replay");
});

test("earlier events come by the page, the last of them without a way to more", async () => {
  const api = open(
    [3, 2, 1].map((n) => event(n, "area-imported", {})),
    2,
  ).install();
  renderApp("/surveys/s1/record");
  await userEvent.click(await screen.findByRole("button", { name: "Earlier events" }));
  await screen.findByText("event 1");
  expect(api.named("listEvents").map(({ query }) => query)).toEqual([{}, { before: "2" }]);
  expect(screen.queryByRole("button", { name: "Earlier events" })).toBeNull();
});

test("a record that may not be read says why, with a way to ask again", async () => {
  new FakeApi()
    .on(readSession, () => session())
    .on(readSurvey, () => survey(["auditor"]))
    .on(listEvents, () => {
      throw new Problem("too-many-requests", "Wait a minute, then try again.");
    })
    .install();
  renderApp("/surveys/s1/record");
  expect((await screen.findByRole("alert")).textContent).toContain("Wait a minute, then try again.");
  screen.getByRole("button", { name: "Try again" });
});
