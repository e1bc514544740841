import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { amendCount, enterCounts, importCounts, listEntries } from "#shared/api/counts.ts";
import { assignVisits, listVisits, type Visit } from "#shared/api/field.ts";
import { listMembers } from "#shared/api/surveys.ts";
import { allEvents } from "#server/db/events.ts";
import { anotherSurvey, declaring, drawCells, putSealedFrame } from "../fixtures/sealed-frame.ts";
import { startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";

const MADE = "2031-05-02T07:00:00Z";
let server: TestServer;
let team: Team;
let visits: Visit[];
let targetId: string;

beforeAll(async () => {
  server = await startTestServer();
  team = await startTeam(server);
}, 60_000);
afterAll(() => server.stop());

/** A survey with ten different cells drawn. */
async function begin(wholeNumbers = true): Promise<void> {
  team = await anotherSurvey(team, "", wholeNumbers);
  const frame = putSealedFrame(server, team.surveyId);
  await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
  const { json } = await team.planner.call(listVisits, { params: here() });
  ({ visits, targetId } = json);
}
beforeEach(() => begin(), 30_000);

const here = () => ({ surveyId: team.surveyId });
const visit = (place: number): Visit => {
  const found = visits[place];
  if (!found) throw new Error(`no visit ${place}`);
  return found;
};
type Said = { state: "counted"; value: number } | { state: "refused" | "not-in-population" | "lost" };
const entry = (place: number, said: Said, changes: Record<string, unknown> = {}) => ({
  id: randomUUID() as string,
  visitId: visit(place).id,
  targetId,
  said,
  note: "",
  madeAt: MADE,
  ...changes,
});
const enter = (entries: ReturnType<typeof entry>[], client = team.lead) =>
  client.call(enterCounts, { params: here(), body: { entries } });
const kinds = () => allEvents(server.platform.db, team.surveyId).map((event) => event.kind);

describe("entering counts", () => {
  test("zero is a count; a state has none; each entry is one event", async () => {
    const { json } = await enter([
      entry(0, { state: "counted", value: 0 }),
      entry(1, { state: "counted", value: 12 }, { note: "by the ditch" }),
      entry(2, { state: "not-in-population" }),
    ]);
    expect(json.visits.map((one) => one.count)).toMatchObject([
      { state: "counted", value: 0, by: "Lead", at: MADE, amended: false },
      { state: "counted", value: 12, note: "by the ditch" },
      { state: "not-in-population" },
    ]);
    expect(json.visits[2]?.count).not.toHaveProperty("value");
    expect(kinds().slice(-3)).toEqual(["count-entered", "count-entered", "count-entered"]);
    const payload = JSON.parse(allEvents(server.platform.db, team.surveyId).at(-1)?.payload ?? "") as object;
    expect(payload).toMatchObject({ unit: visit(2).unit, state: "not-in-population", value: null });
  });

  test("the same entry sent twice, and twice at once, is kept once and answered as if new", async () => {
    const one = entry(0, { state: "counted", value: 3 });
    const before = kinds().length;
    const replies = await Promise.all([enter([one]), enter([one]), enter([one])]);
    expect(replies.map((reply) => reply.status)).toEqual([200, 200, 200]);
    expect(new Set(replies.map((reply) => JSON.stringify(reply.json))).size).toBe(1);
    expect(kinds()).toHaveLength(before + 1);
    const { json } = await team.lead.call(listEntries, { params: { ...here(), visitId: visit(0).id } });
    expect(json.entries).toHaveLength(1);
  });

  test("another content under the same id is refused", async () => {
    const one = entry(0, { state: "counted", value: 3 });
    await enter([one]);
    expect((await enter([{ ...one, said: { state: "counted", value: 4 } }])).json.code).toBe("count-invalid");
    expect((await enter([{ ...one, note: "or so" }])).json.code).toBe("count-invalid");
  });

  test("a cell with a count is amended, not written over; and then none of the entries is kept", async () => {
    await enter([entry(0, { state: "counted", value: 3 })]);
    const refused = await enter([entry(1, { state: "counted", value: 1 }), entry(0, { state: "counted", value: 4 })]);
    expect(refused.json.code).toBe("count-exists");
    expect(refused.json.detail).toContain(`Cell ${visit(0).label} has one: 3`);
    const { json } = await team.lead.call(listVisits, { params: here() });
    expect(json.visits.find((one) => one.id === visit(1).id)?.count.state).toBe("not-visited");
  });

  test("where objects are counted whole a fraction is refused by cell; where they are measured it is kept", async () => {
    const refused = await enter([entry(0, { state: "counted", value: 2.5 })]);
    expect(refused.json.code).toBe("count-invalid");
    expect(refused.json.detail).toContain(`2.5 in cell ${visit(0).label}`);
    await begin(false);
    expect((await enter([entry(0, { state: "counted", value: 2.5 })])).json.visits[0]?.count).toMatchObject({
      value: 2.5,
    });
  });

  test("negative numbers, unknown targets and cells that are not to be visited are refused", async () => {
    expect((await enter([entry(0, { state: "counted", value: -1 })])).json.code).toBe("input-invalid");
    expect((await enter([entry(0, { state: "counted", value: 1 }, { targetId: "x" })])).json.code).toBe(
      "count-invalid",
    );
    expect((await enter([entry(0, { state: "counted", value: 1 }, { visitId: "x" })])).json.code).toBe(
      "cell-not-drawn",
    );
    const other = await anotherSurvey(team);
    const foreign = await other.lead.call(enterCounts, {
      params: { surveyId: other.surveyId },
      body: { entries: [entry(0, { state: "counted", value: 1 })] },
    });
    expect(foreign.json.code).toBe("cell-not-drawn");
  });

  test("a counter writes to their own cells only, and reads only theirs", async () => {
    const members = (await team.planner.call(listMembers, { params: here() })).json.members;
    const memberId = members.find((member) => member.roles.includes("counter"))?.id ?? "";
    const refused = await enter([entry(0, { state: "counted", value: 1 })], team.counter);
    expect(refused.json.code).toBe("not-allowed");
    expect(refused.json.detail).toContain(visit(0).label);
    const params = { ...here(), visitId: visit(0).id };
    expect((await team.counter.call(listEntries, { params })).json.code).toBe("not-allowed");
    await team.lead.call(assignVisits, { params: here(), body: { visitIds: [visit(0).id], memberId, day: "" } });
    const kept = await enter([entry(0, { state: "counted", value: 1 })], team.counter);
    expect(kept.json.visits[0]?.count).toMatchObject({ value: 1, by: "Counter" });
    expect((await team.counter.call(listEntries, { params })).json.entries).toHaveLength(1);
    expect((await enter([entry(1, { state: "counted", value: 1 })], team.auditor)).json.code).toBe("not-allowed");
  });
});

describe("amending", () => {
  const amend = (
    place: number,
    replaces: string,
    said: Said,
    changes: Record<string, unknown> = {},
    client = team.lead,
  ) =>
    client.call(amendCount, {
      params: { ...here(), visitId: visit(place).id },
      body: {
        id: randomUUID(),
        targetId,
        replaces,
        said,
        note: "",
        reason: "misread the sheet",
        madeAt: MADE,
        ...changes,
      },
    });

  test("the old value stays with who, when and why; the new one is in force", async () => {
    const first = entry(0, { state: "counted", value: 3 });
    await enter([first]);
    server.setNow("2031-05-03T10:00:00.000Z");
    const { json } = await amend(0, first.id, { state: "counted", value: 8 }, {}, team.planner);
    expect(json.count).toMatchObject({ state: "counted", value: 8, amended: true, by: "Lead" });
    const list = await team.lead.call(listEntries, { params: { ...here(), visitId: visit(0).id } });
    expect(list.json.entries).toMatchObject([
      { value: 3, replaces: null, reason: "", enteredBy: "Lead" },
      {
        value: 8,
        replaces: first.id,
        reason: "misread the sheet",
        enteredBy: "Planner",
        enteredAt: "2031-05-03T10:00:00.000Z",
      },
    ]);
    expect(kinds().at(-1)).toBe("count-amended");
    server.setNow("2031-05-02T08:00:00.000Z");
  });

  test("an amendment of what is no longer in force is refused, and one sent twice is kept once", async () => {
    const first = entry(0, { state: "counted", value: 3 });
    await enter([first]);
    const id = randomUUID();
    const once = await amend(0, first.id, { state: "counted", value: 8 }, { id });
    const twice = await amend(0, first.id, { state: "counted", value: 8 }, { id });
    expect(twice.json).toEqual(once.json);
    const late = await amend(0, first.id, { state: "counted", value: 9 });
    expect(late.json.code).toBe("changed-meanwhile");
    expect(late.json.detail).toContain("8");
  });

  test("where nothing is written down there is nothing to amend; a reason is needed; a counter can't", async () => {
    expect((await amend(0, randomUUID(), { state: "counted", value: 1 })).json.code).toBe("count-missing");
    const first = entry(0, { state: "counted", value: 3 });
    await enter([first]);
    expect((await amend(0, first.id, { state: "lost" }, { reason: "" })).json.code).toBe("input-invalid");
    expect((await amend(0, first.id, { state: "counted", value: 0.5 })).json.code).toBe("count-invalid");
    expect((await amend(0, first.id, { state: "lost" }, {}, team.counter)).json.code).toBe("not-allowed");
  });
});

describe("a table of counts", () => {
  const table = (lines: string[]) => ({ name: "counts.csv", bytes: new TextEncoder().encode(`${lines.join("\n")}\n`) });
  const send = (
    file: { name: string; bytes: Uint8Array },
    write: string | null,
    changes: Record<string, unknown> = {},
  ) => team.lead.call(importCounts, { params: here(), body: { targetId, zeroWords: [], write, ...changes }, file });

  test("is judged row by row and nothing is written", async () => {
    await enter([entry(3, { state: "counted", value: 5 }), entry(4, { state: "counted", value: 6 })]);
    const undrawn =
      [...Array(70).keys()].map((i) => i + 1).find((unit) => !visits.some((one) => one.unit === unit)) ?? 0;
    const file = table([
      "unit,cell,count,note",
      `${visit(0).unit},${visit(0).label},7,`,
      `${visit(1).unit},${visit(1).label},,`,
      `${visit(2).unit},${visit(2).label},nil,`,
      `${visit(3).unit},${visit(3).label},5,`,
      `${visit(4).unit},${visit(4).label},9,`,
      `${visit(5).unit},${visit(5).label},-2,`,
      `${undrawn},,4,`,
    ]);
    const before = kinds().length;
    const { json } = await send(file, null);
    expect(json.rows.map((row) => row.verdict)).toEqual([
      ...["new", "empty", "question", "same", "different", "refused", "not-drawn"],
    ]);
    expect(json).toMatchObject({
      toWrite: 1,
      written: false,
      importedBefore: null,
      columns: { unit: 0, label: 1, count: 2, note: 3 },
    });
    expect(json.notInTable).toEqual(visits.slice(6).map((one) => one.label));
    expect(kinds()).toHaveLength(before);
  });

  test("is written only with the hash that was judged, in one go, and is known when it comes again", async () => {
    const file = table([
      "unit,count,note,observer",
      `${visit(0).unit},7,=SUM(A1:A9),A. Reeve`,
      `${visit(1).unit},0,,`,
      `${visit(2).unit},refused,,`,
    ]);
    const judged = await send(file, null);
    const other = await send(table(["unit,count", `${visit(0).unit},8`]), judged.json.fileSha256);
    expect(other.json.code).toBe("table-changed");
    const { json } = await send(file, judged.json.fileSha256);
    expect(json).toMatchObject({ written: true, toWrite: 3 });
    expect(kinds().slice(-4)).toEqual(["count-entered", "count-entered", "count-entered", "counts-imported"]);
    const now = (await team.lead.call(listVisits, { params: here() })).json.visits;
    expect(now.slice(0, 3).map((one) => one.count)).toMatchObject([
      // Formula text stays text.
      { state: "counted", value: 7, note: "=SUM(A1:A9); counted by A. Reeve" },
      { state: "counted", value: 0 },
      { state: "refused" },
    ]);
    const again = await send(file, judged.json.fileSha256);
    expect(again.json).toMatchObject({ written: false, toWrite: 0, importedBefore: "2031-05-02T08:00:00.000Z" });
    expect(again.json.rows.map((row) => row.verdict)).toEqual(["same", "same", "same"]);
    expect(kinds().filter((kind) => kind === "counts-imported")).toHaveLength(1);
  });

  test("a word that means zero is asked, and written as zero once somebody has said so", async () => {
    const file = table(["unit,count", `${visit(0).unit},nil`]);
    const asked = await send(file, null);
    expect(asked.json).toMatchObject({ toWrite: 0 });
    const { json } = await send(file, asked.json.fileSha256, { zeroWords: ["nil"] });
    expect(json.written).toBe(true);
    const now = (await team.lead.call(listVisits, { params: here() })).json.visits;
    expect(now[0]?.count).toMatchObject({ state: "counted", value: 0 });
  });

  test("columns that a person chose are taken in place of the guess", async () => {
    const file = table(["a,b,c", `${visit(0).unit},1,4`]);
    const columns = { unit: 0, label: -1, count: 2, state: -1, note: -1 };
    const { json } = await send(file, null, { columns });
    expect(json.rows[0]).toMatchObject({ verdict: "new", said: "4" });
  });

  test("an empty file, an unknown target and a survey without a draw are refused", async () => {
    expect((await send({ name: "x.csv", bytes: new Uint8Array() }, null)).json.code).toBe("file-empty");
    const file = table(["unit,count", "1,2"]);
    expect((await send(file, null, { targetId: "x" })).json.code).toBe("count-invalid");
    const bare = await anotherSurvey(team);
    const params = { surveyId: bare.surveyId };
    const target = (await bare.planner.call(listVisits, { params })).json.targetId;
    const none = await bare.lead.call(importCounts, {
      params,
      body: { targetId: target, zeroWords: [], write: null },
      file,
    });
    expect(none.json.code).toBe("draw-missing");
    expect(
      (await team.counter.call(importCounts, { params: here(), body: { targetId, zeroWords: [], write: null }, file }))
        .json.code,
    ).toBe("not-allowed");
  });
});
