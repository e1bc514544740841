import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { updateDraft } from "#server/db/frames.ts";
import { writeTx } from "#server/db/open.ts";
import { putSealedFrame } from "../fixtures/sealed-frame.ts";
import { startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";
import { runWholeSurvey } from "../fixtures/whole-survey.ts";

/** What never changes once it is written: not by UPDATE, DELETE or REPLACE, whoever holds the database file. */
const PROTECTED = [
  "area_versions",
  "planes",
  "frame_versions",
  "declarations",
  "declarations_abandoned",
  "seeds",
  "draws",
  "draw_entries",
  "draws_withdrawn",
  "pick_acts",
  "count_imports",
  "count_entries",
  "events",
  "kept_estimates",
];

let server: TestServer;
let team: Team;

beforeAll(async () => {
  server = await startTestServer();
  team = await startTeam(server);
  await runWholeSurvey(server, team);
}, 120_000);
afterAll(() => server.stop());

const sqlite = () => server.platform.db.$client;
const rowsOf = (table: string) => sqlite().prepare(`SELECT * FROM ${table}`).all() as Record<string, unknown>[];

describe("guards of the database", () => {
  test("stand on these tables and on no other", () => {
    const names = sqlite().prepare("SELECT DISTINCT tbl_name FROM sqlite_master WHERE type = 'trigger'").pluck().all();
    expect((names as string[]).toSorted()).toEqual(PROTECTED.toSorted());
  });

  for (const table of PROTECTED) {
    test(`${table}: UPDATE, DELETE and REPLACE are refused and nothing changes`, () => {
      const before = rowsOf(table);
      expect(before.length).toBeGreaterThan(0);
      const [column] = Object.keys(before[0] ?? {});
      const refusal = /append-only|never changes/;
      expect(() => sqlite().exec(`UPDATE ${table} SET ${column ?? ""} = ${column ?? ""}`)).toThrow(refusal);
      expect(() => sqlite().exec(`DELETE FROM ${table}`)).toThrow(refusal);
      expect(() => sqlite().exec(`REPLACE INTO ${table} SELECT * FROM ${table} LIMIT 1`)).toThrow(refusal);
      expect(() => sqlite().exec(`INSERT OR REPLACE INTO ${table} SELECT * FROM ${table} LIMIT 1`)).toThrow(refusal);
      expect(rowsOf(table)).toEqual(before);
    });
  }

  test("a draft frame may change until it is sealed", () => {
    const { frameId } = putSealedFrame(server, team.surveyId, { number: 2, draft: true });
    const draft = { areaVersionId: `area-2-${team.surveyId.slice(0, 8)}`, spec: {}, draftSha256: "0".repeat(64) };
    writeTx(server.platform.db, (tx) => updateDraft(tx, frameId, draft));
    const row = rowsOf("frame_versions").find((frame) => frame["id"] === frameId);
    expect(row?.["draft_sha256"]).toBe("0".repeat(64));
  });
});

describe("the connection", () => {
  test("has the pragmas that the guards and a power cut need", () => {
    const pragma = (name: string) => sqlite().pragma(name, { simple: true });
    expect(pragma("journal_mode")).toBe("wal");
    expect(pragma("synchronous")).toBe(2);
    expect(pragma("recursive_triggers")).toBe(1);
    expect(pragma("foreign_keys")).toBe(1);
    expect(pragma("busy_timeout")).toBe(5000);
  });
});
