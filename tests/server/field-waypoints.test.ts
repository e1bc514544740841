import { spawnSync } from "node:child_process";
import { createHash, randomUUID } from "node:crypto";
import { describe, expect, test } from "vitest";
import { type DrawDetail } from "#shared/api/draw.ts";
import { assignVisits, closePick, exportWaypoints } from "#shared/api/field.ts";
import { exportWaypoints as makeFile } from "#server/services/export-waypoints.ts";
import { actingAs } from "../fixtures/acting-as.ts";
import { countCells } from "../fixtures/count-cells.ts";
import { declaring, drawCells } from "../fixtures/sealed-frame.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";

const survey = surveyEachTest();

const exporting = (changes: Record<string, unknown> = {}) =>
  survey.team.lead.call(exportWaypoints, {
    params: survey.here(),
    body: { format: "gpx", nameLength: 10, prefix: "", memberId: null, ...changes } as never,
  });
const textOf = (reply: { bytes: Uint8Array }) => new TextDecoder().decode(reply.bytes);

async function drawn(): Promise<DrawDetail> {
  return drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wr", n: 40 } }));
}

describe("waypoints", () => {
  test("one waypoint a cell, and the file's hash on record", async () => {
    const draw = await drawn();
    const reply = await exporting();
    expect(reply.status).toBe(200);
    expect(reply.headers.get("content-type")).toContain("application/gpx+xml");
    expect(reply.headers.get("content-disposition")).toContain("hallow-moss-2031-draw-1.gpx");
    const text = textOf(reply);
    expect(text.match(/<wpt /g)).toHaveLength(draw.cellsToVisit);
    expect(survey.kinds().at(-1)).toBe("waypoints-exported");
    expect(survey.lastPayload()).toMatchObject({
      format: "gpx",
      cells: draw.cellsToVisit,
      fileSha256: createHash("sha256").update(reply.bytes).digest("hex"),
    });
  });

  test("the file is GPX 1.1 by its published schema", async () => {
    await drawn();
    const text = textOf(await exporting({ prefix: "HM", nameLength: 14 }));
    const lint = spawnSync("xmllint", ["--noout", "--schema", "tests/reference/schemas/gpx.xsd", "-"], { input: text });
    if (lint.error === undefined) expect(lint.stderr.toString()).toContain("validates");
    expect(text).toContain("<name>HM");
  });

  test("the table has a row a cell with centre, corners, draw orders, repeats and share", async () => {
    await drawn();
    const { visits: all } = await survey.visits();
    const reply = await exporting({ format: "csv" });
    expect(reply.headers.get("content-type")).toContain("text/csv");
    const [head, ...lines] = textOf(reply).trimEnd().split("\r\n");
    const columns = head?.split(",") ?? [];
    expect(lines).toHaveLength(all.length);
    const visit = all.find((one) => one.orders.length > 1);
    const row = lines.map((line) => line.split(",")).find((cells) => cells[1] === String(visit?.unit)) ?? [];
    const value = (name: string) => row[columns.indexOf(name)];
    expect(value("draw_orders")).toBe(visit?.orders.join(" "));
    expect(value("repeats")).toBe(String(visit?.orders.length));
    expect(value("label")).toBe(visit?.label);
    expect(value("centre_east_m")).toBe(`${visit?.centre.eastM ?? 0}.000`);
    expect(value("sw_east_m")).toBe(`${(visit?.column ?? 0) * 20}.000`);
    expect(value("ne_north_m")).toBe(`${((visit?.row ?? 0) + 1) * 20}.000`);
    expect(value("centre_longitude")).toBe(visit?.centre.lng.toFixed(7));
    expect(Number(value("nw_latitude"))).toBeGreaterThan(Number(value("sw_latitude")));
    expect(value("share_inside")).toBe(((visit?.shareBillionths ?? 0) / 1e9).toFixed(9));
    // Rule R8: the newest hash before the export stands on it, a witness outside the database.
    expect(value("record_sha256")).toMatch(/^[0-9a-f]{64}$/);
  });
});

describe("which cells and names", () => {
  test("names that clash after cutting are refused with what to change; by draw order they fit", async () => {
    await drawn();
    const clash = await exporting({ nameLength: 4, prefix: "ABC" });
    expect(clash.json.code).toBe("names-clash");
    expect(clash.json.detail).toMatch(/would stand for .*,/);
    const fits = await exporting({ nameLength: 4, prefix: "A", scheme: "order" });
    expect(fits.status).toBe(200);
  });

  test("a counter exports their own cells only, and closed cells are left out", async () => {
    await drawn();
    const { visits: all } = await survey.visits();
    const counter = await survey.memberWith("counter");
    const own = { format: "csv" as const, nameLength: 10, prefix: "", memberId: null };
    const none = await survey.team.counter.call(exportWaypoints, { params: survey.here(), body: own });
    expect(none.json.code).toBe("nothing-to-export");
    const ids = all.slice(0, 2).map((visit) => visit.id);
    await survey.team.lead.call(assignVisits, {
      params: survey.here(),
      body: { visitIds: ids, memberId: counter, day: "" },
    });
    const two = await survey.team.counter.call(exportWaypoints, { params: survey.here(), body: own });
    expect(textOf(two).trimEnd().split("\r\n")).toHaveLength(3);
    const theirs = await survey.team.counter.call(exportWaypoints, {
      params: survey.here(),
      body: { ...own, memberId: await survey.memberWith("lead") },
    });
    expect(theirs.json.code).toBe("not-allowed");
    const body = { id: randomUUID(), state: "refused" as const, reason: "the owner said no" };
    await survey.team.lead.call(closePick, { params: { ...survey.here(), visitId: ids[0] ?? "" }, body });
    const one = await survey.team.counter.call(exportWaypoints, { params: survey.here(), body: own });
    expect(textOf(one).trimEnd().split("\r\n")).toHaveLength(2);
  });

  test("before a draw there is nothing to export", async () => {
    expect((await exporting()).json.code).toBe("draw-missing");
  });
});

describe("what happens while the file is made", () => {
  const wanted = { format: "csv", nameLength: 10, prefix: "", memberId: null } as const;
  const never = new AbortController().signal;
  const exportWhile = (meanwhile: () => unknown) => makeFile(actingAs(survey, "lead", meanwhile), wanted, never);
  /** Sequence of the event that the file quotes, in its last column but one. */
  const quoted = (text: string) => Number(text.trimEnd().split("\r\n").at(-1)?.split(",").at(-2));
  const count = async () => {
    const { visits } = await survey.visits();
    const next = visits.find((visit) => visit.count.state === "not-visited");
    await countCells(survey, () => 1, new Set([next?.unit ?? 0]));
  };

  // The draw is event n; a count comes as n + 1 while the first file is made; the second file quotes that, and is event n + 2.
  test("the file quotes the newest event: where one came meanwhile it is made again", async () => {
    await drawn();
    const before = survey.kinds().length;
    let times = 0;
    const file = await exportWhile(async () => {
      times += 1;
      if (times === 1) await count();
    });
    expect(times).toBe(2);
    expect(quoted(file.text)).toBe(before + 1);
    expect(survey.kinds().slice(before)).toEqual(["count-entered", "waypoints-exported"]);
    expect(survey.lastPayload()).toMatchObject({ fileSha256: createHash("sha256").update(file.text).digest("hex") });
  });

  test("after five files that were outrun it says so and nothing is on record", async () => {
    await drawn();
    const before = survey.kinds().length;
    await expect(exportWhile(count)).rejects.toMatchObject({ code: "changed-meanwhile" });
    expect(survey.kinds().slice(before)).toEqual(Array(5).fill("count-entered"));
  });
});
