import { randomUUID } from "node:crypto";
import { eq } from "drizzle-orm";
import { expect, test } from "vitest";
import { abandonDeclaration, declareDraw, withdrawDraw } from "#shared/api/draw.ts";
import { keepEstimate, readEstimate } from "#shared/api/estimate.ts";
import { assignVisits, closePick } from "#shared/api/field.ts";
import { listSurveys, readSurvey } from "#shared/api/surveys.ts";
import type { WaitingThing } from "#shared/api/waiting.ts";
import type { Role } from "#shared/access/table.ts";
import { findAccountByEmail, updateAccount } from "#server/db/accounts.ts";
import { newestEvent } from "#server/db/events.ts";
import { writeTx } from "#server/db/open.ts";
import { invitations, memberships } from "#server/db/schema/accounts.ts";
import { surveys } from "#server/db/schema/surveys.ts";
import { countCells } from "../fixtures/count-cells.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";
import { anotherSurvey, declaring, drawCells, putSealedFrame } from "../fixtures/sealed-frame.ts";

const use = surveyEachTest();

async function listed(role: Role | "owner") {
  const { json } = await use.team[role].call(listSurveys);
  return json.surveys.find((survey) => survey.id === use.here().surveyId);
}

async function waitingFor(role: Role): Promise<WaitingThing[]> {
  return (await listed(role))?.waiting ?? [];
}

/** Ten different cells, so that none is visited for two picks. */
const drawTen = () => drawCells(use.team, declaring(use.frame.frameId, { design: { kind: "srs-wor", n: 10 } }));

async function shareOut(places: readonly number[], day: string): Promise<void> {
  const { visits } = await use.visits();
  const visitIds = places.map((place) => visits[place]?.id ?? "");
  const memberId = await use.memberWith("counter");
  await use.team.lead.call(assignVisits, { params: use.here(), body: { visitIds, memberId, day } });
}

test("a planner is told the one step that comes next: boundary, sealing, declaring, drawing, then none", async () => {
  const { planner } = use.team;
  const bare = await anotherSurvey(use.team);
  const inBare = async () =>
    (await planner.call(listSurveys)).json.surveys.find((survey) => survey.id === bare.surveyId)?.waiting;
  expect(await inBare()).toEqual([{ kind: "boundary", role: "planner" }]);
  putSealedFrame(use.server, bare.surveyId, { draft: true });
  expect(await inBare()).toEqual([{ kind: "sealing", role: "planner", draft: 1 }]);

  expect(await waitingFor("planner")).toEqual([{ kind: "declaring", role: "planner", withdrawn: null }]);
  const body = declaring(use.frame.frameId);
  const declared = await planner.call(declareDraw, { params: use.here(), body });
  expect(await waitingFor("planner")).toEqual([
    { kind: "drawing", role: "planner", declaredAt: "2031-05-02T08:00:00.000Z", seedGiven: false },
  ]);
  const params = { ...use.here(), declarationId: declared.json.id };
  await planner.call(abandonDeclaration, { params, body: { reason: "the wrong n" } });
  const { id: drawId } = await drawTen();
  expect(await waitingFor("planner")).toEqual([]);
  await planner.call(withdrawDraw, { params: { ...use.here(), drawId }, body: { reason: "the tide table changed" } });
  expect(await waitingFor("planner")).toEqual([{ kind: "declaring", role: "planner", withdrawn: 1 }]);
});

// Now is 2 May, 08:00: of four invitations one can still be accepted, one expired a minute ago; one was withdrawn, one accepted.
test("a planner is told how many invitations are open and how many have expired, and nobody else is", async () => {
  await drawTen();
  const { db } = use.server.platform;
  const invite = (changes: Partial<typeof invitations.$inferInsert>) =>
    db
      .insert(invitations)
      .values({
        id: randomUUID(),
        surveyId: use.here().surveyId,
        role: "counter",
        makesOwner: false,
        email: "new@example.org",
        secretSha256: randomUUID(),
        invitedBy: findAccountByEmail(db, "planner@example.org")?.id ?? "",
        createdAt: "2031-04-18T07:59:00.000Z",
        expiresAt: "2031-05-16T08:00:00.000Z",
        ...changes,
      })
      .run();
  invite({});
  invite({ expiresAt: "2031-05-02T07:59:00.000Z" });
  invite({ withdrawnAt: "2031-05-01T08:00:00.000Z" });
  invite({ acceptedAt: "2031-05-01T08:00:00.000Z" });
  expect(await waitingFor("planner")).toEqual([{ kind: "invitations", role: "planner", open: 1, expired: 1 }]);
  expect((await waitingFor("lead")).map((thing) => thing.kind)).toEqual(["not-shared-out"]);
});

test("a lead is told what is in nobody's list, what was reported, and when all is counted; the planner where nobody is lead", async () => {
  const { lead } = use.team;
  await drawTen();
  await shareOut([0, 1, 2], "Friday");
  expect(await waitingFor("lead")).toEqual([{ kind: "not-shared-out", role: "lead", cells: 7, of: 10 }]);
  expect(await waitingFor("planner")).toEqual([]);

  const { visits } = await use.visits();
  const [first] = visits;
  // One cell is reported as refused, nine are counted, which leaves none to be shared out.
  await countCells(use, (unit) => (unit === first?.unit ? "refused" : unit % 3));
  expect(await waitingFor("lead")).toEqual([{ kind: "closing", role: "lead", cells: 1 }]);

  const body = { id: randomUUID(), state: "refused" as const, reason: "the owner said no" };
  await lead.call(closePick, { params: { ...use.here(), visitId: first?.id ?? "" }, body });
  expect(await waitingFor("lead")).toEqual([{ kind: "not-shared-out", role: "lead", cells: 1, of: 10 }]);
  await countCells(use, (unit) => unit % 3);
  expect(await waitingFor("lead")).toEqual([{ kind: "all-counted", role: "lead", cells: 10 }]);
  expect(await waitingFor("planner")).toEqual([]);

  const leadMember = await use.memberWith("lead");
  const removedAt = "2031-05-02T08:00:00.000Z";
  writeTx(use.server.platform.db, (tx) =>
    tx.update(memberships).set({ removedAt }).where(eq(memberships.memberId, leadMember)).run(),
  );
  expect(await waitingFor("planner")).toEqual([{ kind: "all-counted", role: "planner", cells: 10 }]);
});

// The role stays while an account is closed: it may be opened again.
test("the planner is told what a lead would do while the only lead's account is closed", async () => {
  await drawTen();
  expect(await waitingFor("planner")).toEqual([]);
  const { db } = use.server.platform;
  const account = findAccountByEmail(db, "lead@example.org");
  const setClosed = (closedAt: string | null) =>
    writeTx(db, (tx) => updateAccount(tx, account?.id ?? "", { closedAt }));
  setClosed("2031-05-02T08:00:00.000Z");
  expect(await waitingFor("planner")).toEqual([{ kind: "not-shared-out", role: "planner", cells: 10, of: 10 }]);
  setClosed(null);
});

test("an estimate older than a count waits for planner and lead, one that is newer waits for nobody", async () => {
  const { lead } = use.team;
  await drawTen();
  const { visits } = await use.visits();
  const last = visits.at(-1)?.unit ?? 0;
  await countCells(use, (unit) => unit % 3, new Set(visits.map((visit) => visit.unit).filter((unit) => unit !== last)));
  const { resultSha256 } = (await lead.call(readEstimate, { params: use.here() })).json;
  use.server.setNow("2031-05-03T08:00:00.000Z");
  expect((await lead.call(keepEstimate, { params: use.here(), body: { resultSha256 } })).status).toBe(200);
  expect((await waitingFor("planner")).map((thing) => thing.kind)).toEqual([]);
  use.server.setNow("2031-05-04T08:00:00.000Z");
  await countCells(use, () => 4);
  const older = { kind: "estimate-older", keptAt: "2031-05-03T08:00:00.000Z" };
  expect(await waitingFor("planner")).toEqual([{ ...older, role: "planner" }]);
  expect(await waitingFor("lead")).toEqual([{ ...older, role: "lead" }]);
  use.server.setNow("2031-05-02T08:00:00.000Z");
});

test("a counter is told of their own cells only: how many are left, for which day, and never how many there are", async () => {
  await drawTen();
  expect(await waitingFor("counter")).toEqual([]);
  await shareOut([0, 1, 2], "Friday");
  use.server.setNow("2031-05-02T08:01:00.000Z");
  await shareOut([3], "Saturday");
  const { visits } = await use.visits();
  await countCells(use, () => 2, new Set([visits[1]?.unit ?? 0, visits[7]?.unit ?? 0]));
  expect(await waitingFor("counter")).toEqual([
    {
      kind: "own-cells",
      role: "counter",
      cells: 3,
      of: 4,
      days: [
        { day: "Friday", cells: 2 },
        { day: "Saturday", cells: 1 },
      ],
    },
  ]);
  const told = await use.team.counter.call(readSurvey, { params: use.here() });
  expect(told.json.stages).toEqual([
    { stage: "field", state: "in-work", note: "3 of your 4 cells to visit" },
    { stage: "counts", state: "in-work", note: "1 of your 4 cells" },
  ]);
  expect((await listed("counter"))?.newestEvent).toBeNull();
  use.server.setNow("2031-05-02T08:00:00.000Z");
});

test("an auditor is given the newest hash to keep, once something is on record that they keep it for", async () => {
  const bare = await anotherSurvey(use.team);
  const { surveys: seen } = (await use.team.auditor.call(listSurveys)).json;
  expect(seen.find((survey) => survey.id === bare.surveyId)?.waiting).toEqual([]);
  await drawTen();
  await shareOut([0], "Friday");
  const newest = newestEvent(use.server.platform.db, use.here().surveyId);
  expect(newest?.kind).toBe("cells-assigned");
  expect(await waitingFor("auditor")).toEqual([
    {
      kind: "newest-hash",
      role: "auditor",
      because: "drawn",
      at: "2031-05-02T08:00:00.000Z",
      sequence: newest?.sequence,
      sha256: newest?.sha256,
    },
  ]);
});

test("an archived survey stays on the list, says since when, and waits for nobody", async () => {
  const { db } = use.server.platform;
  const archivedAt = "2031-05-02T08:00:00.000Z";
  db.update(surveys).set({ archivedAt }).where(eq(surveys.id, use.here().surveyId)).run();
  expect(await listed("planner")).toMatchObject({ archivedAt, waiting: [] });
  expect((await use.team.planner.call(readSurvey, { params: use.here() })).json.archivedAt).toBe(archivedAt);
});

test("an owner is told what the installation waits for, and others are not", async () => {
  const owners = (await use.team.owner.call(listSurveys)).json.installation;
  expect(owners).toMatchObject({ publicAddressMissing: true, backupError: null });
  expect((await use.team.planner.call(listSurveys)).json.installation).toBeNull();
});
