import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import { Problem } from "#shared/problem.ts";
import type { ReplayReport } from "#shared/record/replay.ts";
import type { ReplayAt } from "../../../src/workers/replay.ts";
import { type ReplayWanted, replayWanted } from "../../../src/workers/replay-work.ts";
import { goodRecord } from "../../fixtures/record.ts";
import { FakeApi } from "../app/fake-api.ts";
import { session } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

type Replay = (wanted: ReplayWanted, onProgress: (at: ReplayAt) => void, signal: AbortSignal) => Promise<ReplayReport>;

// The worker's own work, done in the page: jsdom has no workers.
const inPage: Replay = (wanted) => Promise.resolve().then(() => replayWanted(wanted, () => undefined));
const replayRecord = vi.hoisted(() => vi.fn<Replay>());
vi.mock("../../../src/workers/replay.ts", () => ({ replayRecord }));

beforeEach(() => {
  replayRecord.mockReset().mockImplementation(inPage);
  new FakeApi().on(readSession, () => session({ account: null })).install();
});
afterEach(() => {
  vi.unstubAllGlobals();
});

async function choose(name: string, text: string) {
  await userEvent.upload(
    await screen.findByLabelText("Drop the record file here", { selector: "input" }),
    new File([text], name, { type: "application/json" }),
  );
}

const start = async () => userEvent.click(screen.getByRole("button", { name: "Replay this record" }));

test("a file that is no record is refused by its name, and what was chosen and typed stays", async () => {
  renderApp("/replay");
  await choose("fen.geojson", '{"type":"FeatureCollection"}');
  await userEvent.type(screen.getByLabelText("Fingerprint of the signing key"), "ab12");
  await start();
  expect((await screen.findByRole("alert")).textContent).toMatch(
    /^This is not a record file\. “fen\.geojson”: format: expected "quillet-record\/1", found nothing\./,
  );
  screen.getByDisplayValue("ab12");
  screen.getByText(/^fen\.geojson, /);
  await choose("photo.json", "\u0089PNG");
  await start();
  await screen.findByText(/“photo\.json” holds no JSON/);
});

test("a good record passes every check, and what no record shows stands at the end", async () => {
  renderApp("/replay");
  await choose("record.json", JSON.stringify(goodRecord()));
  await start();
  const checks = within(await screen.findByRole("list", { name: "Checks" })).getAllByRole("listitem");
  expect(checks.filter((check) => check.dataset["outcome"] === "failed")).toEqual([]);
  expect(checks.filter((check) => check.dataset["outcome"] === "passed").length).toBeGreaterThan(20);
  screen.getByRole("heading", { name: "What no record shows" });
  screen.getByText(/^Replayed in .* from record\.json\.$|from record\.json\.$/);
});

test("one changed count is found and named: the cell, what the record says, what its event says", async () => {
  const record = goodRecord();
  const [changed] = record.counts.filter(({ value }) => value === 5);
  if (changed === undefined) throw new RangeError("the good record holds a count of 5");
  changed.value = 50;
  renderApp("/replay");
  await choose("changed.json", JSON.stringify(record));
  await start();
  const checks = within(await screen.findByRole("list", { name: "Checks" })).getAllByRole("listitem");
  const failed = checks.filter((check) => check.dataset["outcome"] === "failed");
  const [counts] = failed.filter((check) => check.textContent.includes("The counts are those of the events"));
  if (counts === undefined) throw new RangeError("the changed count was not found");
  const cells = within(counts)
    .getAllByRole("cell")
    .map((cell) => cell.textContent);
  expect(within(counts).getByRole("rowheader").textContent).toMatch(/^cell \w+ \(unit \d+\)/);
  expect(cells[0]).toBe("50");
  expect(cells[1]).toMatch(/^5, as event \d+ says/);
});

test("hashes and fingerprint go out without their spaces, and are still there for the next record", async () => {
  renderApp("/replay");
  await choose("record.json", JSON.stringify(goodRecord()));
  await userEvent.type(screen.getByLabelText("Hashes that you were given"), "AB12 cd34{Enter}EF56");
  await userEvent.type(screen.getByLabelText("Fingerprint of the signing key"), "12 34");
  await start();
  await userEvent.click(await screen.findByRole("button", { name: "Replay another record" }));
  expect(replayRecord.mock.calls[0]?.[0]).toMatchObject({ heldHashes: ["ab12cd34", "ef56"], fingerprint: "1234" });
  screen.getByDisplayValue("12 34");
  expect(screen.getByLabelText("Hashes that you were given")).toHaveProperty("value", "AB12 cd34\nEF56");
});

test("a long replay says how far it is, and cancelling it goes back to the form as it was", async () => {
  replayRecord.mockImplementation(
    (_, onProgress, signal) =>
      new Promise((_resolve, reject) => {
        onProgress({ share: 0.4, what: "the draws" });
        signal.addEventListener("abort", () => reject(new Problem("cancelled", "Nothing was checked.")));
      }),
  );
  renderApp("/replay");
  await choose("record.json", "{}");
  await start();
  const bar = await screen.findByRole("progressbar", { name: "Replaying the record" });
  await waitFor(() => {
    expect(bar.getAttribute("aria-valuenow")).toBe("40");
  });
  screen.getByText("the draws");
  await userEvent.click(screen.getByRole("button", { name: "Cancel" }));
  await waitFor(() => {
    expect(screen.queryByRole("progressbar")).toBeNull();
  });
  expect(screen.queryByRole("alert")).toBeNull();
  screen.getByText(/^record\.json, /);
  expect(screen.getByRole("button", { name: "Replay this record" }).closest("[hidden]")).toBeNull();
});

test("leaving the page ends the replay", async () => {
  let ended = false;
  replayRecord.mockImplementation(
    (_wanted, _onProgress, signal) =>
      new Promise(() => {
        signal.addEventListener("abort", () => {
          ended = true;
        });
      }),
  );
  const { router } = renderApp("/replay");
  await choose("record.json", "{}");
  await start();
  await screen.findByRole("progressbar");
  await router.navigate("/sign-in");
  await waitFor(() => {
    expect(ended).toBe(true);
  });
});

test("a file that was changed after it was chosen is named and asked for again", async () => {
  renderApp("/replay");
  const gone = new File(["{}"], "record.json");
  gone.text = () => Promise.reject(new DOMException("gone", "NotReadableError"));
  await userEvent.upload(await screen.findByLabelText("Drop the record file here", { selector: "input" }), gone);
  await start();
  expect((await screen.findByRole("alert")).textContent).toContain(
    "“record.json” was changed or moved since it was chosen. Choose it again.",
  );
});
