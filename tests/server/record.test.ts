import { createHash, createPublicKey, verify } from "node:crypto";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { ALL_CONTRACTS } from "#shared/api/all.ts";
import { health, listEvents, readOpenApi, readRecordFile, readSchema, ready } from "#shared/api/record.ts";
import { readSurvey } from "#shared/api/surveys.ts";
import { parseRecordFile, type RecordFile } from "#shared/record/record-file.ts";
import { replay } from "#shared/record/replay.ts";
import { startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";
import { anotherSurvey, putSealedFrame } from "../fixtures/sealed-frame.ts";
import { runWholeSurvey } from "../fixtures/whole-survey.ts";

let server: TestServer;
let team: Team;
let record: RecordFile;
const here = () => ({ surveyId: team.surveyId });

beforeAll(async () => {
  server = await startTestServer();
  team = await startTeam(server);
  await runWholeSurvey(server, team);
  const reply = await team.auditor.call(readRecordFile, { params: here() });
  record = parseRecordFile(new TextDecoder().decode(reply.bytes));
}, 120_000);
afterAll(() => server.stop());

describe("the record file", () => {
  test("holds every act of the survey, in order", () => {
    expect(record.events.map(({ envelope }) => envelope.kind)).toEqual([
      ...["survey-created", "member-added", "member-added", "member-added", "member-added"],
      ...["area-imported", "frame-sealed", "draw-declared", "declaration-abandoned"],
      ...["draw-declared", "seed-given", "draw-made", "draw-withdrawn"],
      ...["draw-declared", "seed-given", "draw-made", "cells-assigned", "cells-assigned", "waypoints-exported"],
      ...["count-entered", "count-entered", "count-entered", "count-entered", "count-entered", "pick-closed"],
      ...["count-amended", "count-amended"],
      ...record.counts.filter((count) => count.importId !== null).map(() => "count-entered"),
      ...["counts-imported", "estimate-kept"],
    ]);
    expect(record.draws.map((draw) => [draw.number, draw.withdrawn?.reason ?? "live"])).toEqual([
      [1, "the tide table changed"],
      [2, "live"],
    ]);
    expect(record.pickActs.map((act) => act.kind)).toEqual(["close", "close-counted"]);
    expect(record.people.map((person) => person.name).toSorted()).toEqual(["Auditor", "Counter", "Lead", "Planner"]);
  });

  // R7: the record counts the installation's other surveys with the same boundary file.
  test("counts the other surveys that began with its boundary file", async () => {
    expect(record.elsewhere).toEqual({ sameSource: 0, sameFrame: 0 });
    putSealedFrame(server, (await anotherSurvey(team)).surveyId);
    expect((await team.auditor.call(listEvents, { params: here() })).json.elsewhere).toEqual({
      sameSource: 1,
      sameFrame: 1,
    });
  });

  test("names people and never an address", () => {
    expect(JSON.stringify(record)).not.toContain("@");
  });

  // Outside the program: the chain by Node's SHA-256 and sorted JSON, the signatures by Node's Ed25519 (RFC 8032).
  test("its chain is unbroken and its signatures hold, by Node's own crypto", () => {
    const der = Buffer.concat([Buffer.from("302a300506032b6570032100", "hex"), Buffer.from(record.publicKey, "hex")]);
    const key = createPublicKey({ key: der, format: "der", type: "spki" });
    let previous = "0".repeat(64);
    record.events.forEach(({ envelope, salt, payload, sha256, signature }, i) => {
      expect(envelope.sequence).toBe(i + 1);
      expect(envelope.previous).toBe(previous);
      expect(envelope.payloadSha256).toBe(hash(sorted({ salt, payload })));
      expect(sha256).toBe(hash(sorted(envelope)));
      expect(verify(null, Buffer.from(sha256, "hex"), key, Buffer.from(signature, "hex"))).toBe(true);
      previous = sha256;
    });
  });

  test("a replay of it finds nothing wrong", () => {
    const { checks } = replay(record);
    expect(checks.filter((check) => check.outcome === "failed").map((check) => check.detail)).toEqual([]);
    expect(checks.filter((check) => check.outcome === "passed").length).toBeGreaterThan(12);
  });

  test("is for planners, leads and auditors", async () => {
    expect((await team.counter.call(readRecordFile, { params: here() })).json.code).toBe("not-allowed");
  });
});

describe("the list of events", () => {
  test("comes newest first, in pages, with names and the key's fingerprint", async () => {
    const { json } = await team.auditor.call(listEvents, { params: here() });
    expect(json.events[0]).toMatchObject({ kind: "estimate-kept", by: "Lead", sequence: record.events.length });
    expect(json.newest).toEqual({ sequence: record.events.length, sha256: record.events.at(-1)?.sha256 });
    expect(json.keyFingerprint).toBe(createHash("sha256").update(Buffer.from(record.publicKey, "hex")).digest("hex"));
    expect(json.more).toBe(false);
    const first = await team.auditor.call(listEvents, { params: here(), query: { before: "3" } });
    expect(first.json.events.map((event) => event.sequence)).toEqual([2, 1]);
  });
});

describe("stages at a glance", () => {
  test("say what is there and what needs a look", async () => {
    const { stages } = (await team.planner.call(readSurvey, { params: here() })).json;
    const notes = Object.fromEntries(stages.map(({ stage, state, note }) => [stage, `${state}: ${note}`]));
    expect(notes).toMatchObject({
      area: "done: 1 area",
      frame: "done: version 1, sealed",
      plan: "done: n = 12 declared",
      draw: "done: draw 2, live",
      estimate: "done: kept on 3 May",
      record: `in-work: ${record.events.length} events`,
    });
    expect(notes["counts"]).toMatch(/^done: (\d+) of \1 cells$/);
    expect(notes["field"]).toMatch(/^done: \d+ cells visited$/);
  });
});

describe("the interface about itself", () => {
  test("health and readiness need no sign-in", async () => {
    const nobody = server.client();
    expect((await nobody.call(health)).json).toEqual({ status: "up", version: "0.0.0-test" });
    expect((await nobody.call(ready)).json).toEqual({ status: "ready" });
  });

  test("the OpenAPI document names every contract, its parts of the path and its refusals", async () => {
    const reply = await server.client().call(readOpenApi);
    const document = JSON.parse(new TextDecoder().decode(reply.bytes)) as {
      openapi: string;
      paths: Record<string, Record<string, { operationId: string; parameters?: { name: string; in: string }[] }>>;
    };
    expect(document.openapi).toBe("3.1.0");
    const operations = Object.values(document.paths).flatMap((path) => Object.values(path));
    expect(operations.map((one) => one.operationId).toSorted()).toEqual(
      ALL_CONTRACTS.map((one) => one.name).toSorted(),
    );
    const close = document.paths["/api/surveys/{surveyId}/visits/{visitId}/close"]?.["post"];
    expect(close?.parameters?.map((one) => [one.name, one.in])).toEqual([
      ["surveyId", "path"],
      ["visitId", "path"],
    ]);
  });

  test("the schemas of the stored formats are served", async () => {
    for (const name of ["quillet-frame-1", "quillet-record-1"] as const) {
      const reply = await server.client().call(readSchema, { params: { name } });
      expect(reply.headers.get("content-type")).toContain("application/schema+json");
      const schema = JSON.parse(new TextDecoder().decode(reply.bytes)) as Record<string, unknown>;
      expect(schema["$schema"]).toBe("https://json-schema.org/draft/2020-12/schema");
      expect(schema["additionalProperties"]).toBe(false);
      expect(schema["required"]).toContain("format");
    }
    const none = await server.client().call(readSchema, { params: { name: "quillet-other-1" as never } });
    expect(none.status).toBe(400);
  });
});

const hash = (text: string): string => createHash("sha256").update(text, "utf8").digest("hex");

/** JSON with the members of every object in the order of their names (RFC 8785 for these values). */
function sorted(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(sorted).join(",")}]`;
  if (typeof value !== "object" || value === null) return JSON.stringify(value);
  const members = Object.entries(value).toSorted(([a], [b]) => (a < b ? -1 : 1));
  return `{${members.map(([name, of]) => `${JSON.stringify(name)}:${sorted(of)}`).join(",")}}`;
}
