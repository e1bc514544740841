import { createHash } from "node:crypto";
import { readFileSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { importArea, listAreas, makePlane, readAreaFile, readPlane, searchCrs } from "#shared/api/area.ts";
import {
  type FrameSpec,
  listFrames,
  readFrameCells,
  readFrameList,
  readFrameStatement,
  saveDraftFrame,
  sealFrame,
} from "#shared/api/frame.ts";
import { EDGE_PRESETS } from "#shared/frame/cell-spec.ts";
import { listSha256 } from "#shared/frame/list.ts";
import { unpackCells } from "#shared/frame/pack.ts";
import { parseStatement, rebuildCells } from "#shared/frame/statement.ts";
import { listEvents } from "#shared/api/record.ts";
import { startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";

const fromImports = (name: string) => ({
  name,
  bytes: new Uint8Array(readFileSync(`tests/reference/imports/made/${name}`)),
});
const boundary = fromImports("good_polygon_hole.geojson");

let server: TestServer;
let team: Team;
let surveyId: string;

beforeAll(async () => {
  server = await startTestServer();
  team = await startTeam(server);
  surveyId = team.surveyId;
});

afterAll(() => server.stop());

const specFor = (areaId: string, side = 50): FrameSpec => ({
  areaId,
  epsg: 32633,
  cells: {
    shape: "rectangle",
    widthMm: side * 1000,
    heightMm: side * 1000,
    originEastMm: 0,
    originNorthMm: 0,
    rotationMicroDegrees: 0,
  },
  membership: EDGE_PRESETS.clip.membership,
  countIn: "inside",
  leftOut: [],
});

async function imported() {
  const { json, status } = await team.planner.call(importArea, { params: { surveyId }, body: {}, file: boundary });
  expect(status).toBe(200);
  await team.planner.call(makePlane, { params: { surveyId, areaId: json.id }, body: { epsg: 32633 } });
  return json;
}

describe("the study area", () => {
  test("a boundary file is kept byte for byte with its report, and its import is an event", async () => {
    const area = await imported();
    expect(area.report).toMatchObject({
      features: 1,
      parts: 1,
      holes: 1,
      sha256: createHash("sha256").update(boundary.bytes).digest("hex"),
    });
    const file = await team.auditor.call(readAreaFile, { params: { surveyId, areaId: area.id } });
    expect(file.bytes).toEqual(boundary.bytes);
    const { json } = await team.auditor.call(listEvents, { params: { surveyId } });
    expect(json.events[0]).toMatchObject({
      kind: "area-imported",
      payload: { areaId: area.id, fileName: boundary.name },
    });
    expect((await team.counter.call(listAreas, { params: { surveyId } })).json.areas[0]?.outline[0]).toHaveLength(2);
  });

  test("a file without a known system is asked about, nothing is kept, and the answer settles it", async () => {
    const before = (await team.planner.call(listAreas, { params: { surveyId } })).json.areas.length;
    const file = fromImports("metres_no_crs.geojson");
    const asked = await team.planner.call(importArea, { params: { surveyId }, body: {}, file });
    expect(asked).toMatchObject({ status: 422, json: { code: "area-question", question: { kind: "crs" } } });
    expect((await team.planner.call(listAreas, { params: { surveyId } })).json.areas).toHaveLength(before);
    const answered = await team.planner.call(importArea, { params: { surveyId }, body: { crs: "32633" }, file });
    expect(answered.status).toBe(200);
    expect(answered.json.report.crs.epsg).toBe(32633);
  });

  test("a system is found by its number and by its name", async () => {
    const byCode = await team.planner.call(searchCrs, { query: { text: "25831" } });
    expect(byCode.json.systems[0]?.epsg).toBe(25831);
    const byName = await team.planner.call(searchCrs, { query: { text: "UTM zone 33N", projected: "yes" } });
    expect(byName.json.systems.map((system) => system.epsg)).toContain(32633);
  });

  test("rings on a plane are made once: the same text comes back for everybody", async () => {
    const area = await imported();
    const params = { surveyId, areaId: area.id };
    const first = await team.planner.call(makePlane, { params, body: { epsg: 32633 } });
    const again = await team.planner.call(makePlane, { params, body: { epsg: 32633 } });
    const read = await team.lead.call(readPlane, { params: { ...params, epsg: "32633" } });
    expect(again.json).toEqual(first.json);
    expect(read.json).toEqual(first.json);
    expect(first.json.rings.flat(2).flat().every(Number.isInteger)).toBe(true);
  });
});

describe("the frame", () => {
  test("a sealed frame rebuilds to the same list from its statement alone", async () => {
    const area = await imported();
    const draft = await keepDraft(specFor(area.id));
    const cells = rebuiltUnits(area.id);
    const params = { surveyId, frameId: draft.json.id };
    const wrong = await team.planner.call(sealFrame, {
      params,
      body: { draftSha256: draft.json.draftSha256, cells: 3 },
    });
    expect(wrong).toMatchObject({ status: 409, json: { code: "frame-changed" } });
    const body = { draftSha256: draft.json.draftSha256, cells: await cells };
    const sealed = await team.planner.call(sealFrame, { params, body });
    expect(sealed.status).toBe(200);

    const statement = await team.auditor.call(readFrameStatement, { params });
    const text = new TextDecoder().decode(statement.bytes);
    expect(createHash("sha256").update(text).digest("hex")).toBe(sealed.json.sealed?.frameSha256);
    expect(listSha256(rebuildCells(parseStatement(text)))).toBe(sealed.json.sealed?.listSha256);
    const list = await team.auditor.call(readFrameList, { params });
    expect(createHash("sha256").update(list.bytes).digest("hex")).toBe(sealed.json.sealed?.listSha256);
    const packed = await team.counter.call(readFrameCells, { params });
    expect(unpackCells(packed.bytes).units).toBe(sealed.json.sealed?.units);

    const again = await team.planner.call(sealFrame, { params, body });
    expect(again).toMatchObject({ status: 409, json: { code: "frame-already-sealed" } });
  });

  test("changing the cells after a seal makes the next version and leaves the sealed one as it was", async () => {
    const area = await imported();
    const before = (await team.planner.call(listFrames, { params: { surveyId } })).json.frames;
    const draft = await keepDraft(specFor(area.id, 40));
    expect(draft.json).toMatchObject({ state: "draft", number: (before[0]?.number ?? 0) + 1 });
    const after = (await team.planner.call(listFrames, { params: { surveyId } })).json.frames;
    expect(after.find((frame) => frame.id === before[0]?.id)).toEqual(before[0]);
  });

  test("settings that somebody changed meanwhile are not sealed", async () => {
    const area = await imported();
    const seen = await keepDraft(specFor(area.id, 40));
    const cells = await rebuiltUnits(area.id, 40);
    await keepDraft(specFor(area.id, 60));
    const reply = await team.planner.call(sealFrame, {
      params: { surveyId, frameId: seen.json.id },
      body: { draftSha256: seen.json.draftSha256, cells },
    });
    expect(reply).toMatchObject({ status: 409, json: { code: "frame-changed" } });
    const { json } = await team.planner.call(listFrames, { params: { surveyId } });
    expect(json.frames[0]?.state).toBe("draft");
  });

  test("an odd number of millimetres is refused with the next even one", async () => {
    const area = await imported();
    const spec = specFor(area.id);
    const odd = { ...spec, cells: { ...spec.cells, widthMm: 50_001 } };
    const reply = await keepDraft(odd);
    expect(reply).toMatchObject({ status: 422, json: { code: "cell-size" } });
  });
});

/** Keeps a draft over the one that is there now. */
async function keepDraft(spec: FrameSpec) {
  const { frames } = (await team.planner.call(listFrames, { params: { surveyId } })).json;
  const seen = frames[0]?.state === "draft" ? frames[0].draftSha256 : null;
  return team.planner.call(saveDraftFrame, { params: { surveyId }, body: { spec, seen } });
}

/** What the planner's browser would have counted: the cells of the plane's rings. */
async function rebuiltUnits(areaId: string, side = 50): Promise<number> {
  const { json } = await team.planner.call(readPlane, { params: { surveyId, areaId, epsg: "32633" } });
  const { ringsFromJson } = await import("#shared/geometry/rings.ts");
  const { previewFrame } = await import("#shared/frame/preview.ts");
  return previewFrame(ringsFromJson(json.rings), specFor(areaId, side).cells).presets.clip.cells;
}
