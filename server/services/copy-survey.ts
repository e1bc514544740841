import type { ImportReport } from "#shared/area/report.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { findAccount } from "../db/accounts.ts";
import { areasOf } from "../db/areas.ts";
import { copyArea, insertWholeSurvey, type RoleHeld, rolesHeld } from "../db/copies.ts";
import { newestEvent } from "../db/events.ts";
import { framesOf, specOf } from "../db/frames.ts";
import { insertMember, upsertMembership } from "../db/members.ts";
import { type Tx, writeTx } from "../db/open.ts";
import { findSurvey, type SurveyRow, type TargetRow, targetsOf } from "../db/surveys.ts";
import { makePlane } from "./make-plane.ts";
import { newId } from "./new-id.ts";
import { readSettings } from "./read-settings.ts";
import { recordEvent } from "./record-event.ts";
import { keepDraft } from "./save-draft-frame.ts";
import { tellAdded } from "./tell-roles.ts";

interface NewCopy {
  readonly name: string;
  readonly seasonName: string;
  /** With everybody who holds a role, in the same roles; otherwise whoever copies is its planner and alone. */
  readonly withPeople: boolean;
}

/** The survey that is being begun, and who begins it when. */
interface Begun {
  readonly tx: Tx;
  readonly ctx: Context;
  readonly surveyId: string;
  readonly memberId: string;
  readonly at: string;
}

/**
 * Begins a survey for a next season with the settings and targets of this one, its newest boundary, and the cells of its
 * newest frame as a draft. Nothing that was sealed, drawn or counted goes along. Returns the id of the new survey.
 */
export async function copySurvey(ctx: Context, wanted: NewCopy, signal: AbortSignal): Promise<string> {
  await planeForDraft(ctx, signal);
  return writeTx(ctx.db, (tx) => {
    const from = findSurvey(tx, ctx.surveyId);
    const newest = newestEvent(tx, ctx.surveyId);
    if (!from || !newest) throw new Problem("survey-not-found", "It has been deleted.");
    const begun = { tx, ctx, surveyId: newId(ctx), memberId: newId(ctx), at: ctx.now().toISOString() };
    begin(begun, from, wanted, newest.sha256);
    addPeople(begun, wanted.withPeople ? rolesHeld(tx, ctx.surveyId) : []);
    const area = areasOf(tx, ctx.surveyId)[0];
    if (area) addArea(begun, area.id);
    return begun.surveyId;
  });
}

/**
 * The plane that the newest frame's system needs on the newest boundary; it is there already, unless the boundary is newer
 * than the frame. Where it can't be made, the copy gets no draft.
 */
async function planeForDraft(ctx: Context, signal: AbortSignal): Promise<void> {
  const area = areasOf(ctx.db, ctx.surveyId)[0];
  const frame = framesOf(ctx.db, ctx.surveyId)[0];
  if (!area || !frame) return;
  try {
    await makePlane(ctx, area.id, specOf(frame).epsg, signal);
  } catch (error) {
    if (!(error instanceof Problem) || error.code === "cancelled") throw error;
  }
}

function begin({ tx, ctx, surveyId, memberId, at }: Begun, from: SurveyRow, wanted: NewCopy, newest: string): void {
  const season = { id: newId(ctx), name: wanted.seasonName };
  const copied = targetsOf(tx, from.id).map((row): TargetRow => ({ ...row, id: newId(ctx), surveyId }));
  const [first] = copied;
  if (!first) throw new Error(`survey ${from.id} has no target`);
  const { singular, plural, countingRule, wholeNumbers } = first;
  insertWholeSurvey(
    tx,
    { ...from, id: surveyId, name: wanted.name, createdAt: at, archivedAt: null },
    { ...season, surveyId, position: 1, startsOn: null, endsOn: null, createdAt: at },
    copied,
  );
  insertMember(tx, { id: memberId, surveyId, accountId: ctx.account.id, addedAt: at });
  const about = { surveyId, at, memberId };
  recordEvent(tx, ctx, {
    ...about,
    kind: "survey-created",
    payload: {
      version: 1,
      name: wanted.name,
      target: { id: first.id, singular, plural, countingRule, wholeNumbers },
      season,
      timeZone: from.timeZone,
      level: from.level,
    },
  });
  recordEvent(tx, ctx, {
    ...about,
    kind: "survey-copied",
    payload: { version: 1, from: from.id, newestSha256: newest },
  });
  if (copied.length === 1) return;
  // How a survey began names one target; the others come by a change of its settings.
  const after = readSettings(tx, surveyId);
  const before = { ...after, targets: after.targets.slice(0, 1) };
  recordEvent(tx, ctx, { ...about, kind: "settings-changed", payload: { version: 1, before, after } });
}

/** Whoever copies is a planner; the others keep the roles that they hold. Each is somebody new to the new record. */
function addPeople({ tx, ctx, surveyId, memberId, at }: Begun, held: readonly RoleHeld[]): void {
  const own: RoleHeld = { accountId: ctx.account.id, name: ctx.account.name, role: "planner" };
  const others = held.filter(({ accountId, role }) => accountId !== own.accountId || role !== own.role);
  const ids = new Map([[own.accountId, memberId]]);
  for (const { accountId, name, role } of [own, ...others]) {
    let member = ids.get(accountId);
    if (member === undefined) {
      member = newId(ctx);
      ids.set(accountId, member);
      insertMember(tx, { id: member, surveyId, accountId, addedAt: at });
    }
    upsertMembership(tx, member, role, at);
    const payload = { version: 1, member, name, role } as const;
    recordEvent(tx, ctx, { surveyId, at, memberId, kind: "member-added", payload });
    const account = findAccount(tx, accountId);
    if (account) tellAdded(tx, { ...ctx, surveyId }, account, role);
  }
}

function addArea({ tx, ctx, surveyId, memberId, at }: Begun, fromId: string): void {
  const head = { id: newId(ctx), surveyId, number: 1, importedBy: memberId, createdAt: at };
  const area = copyArea(tx, fromId, head, () => newId(ctx));
  const report = area.report as ImportReport;
  recordEvent(tx, ctx, {
    surveyId,
    at,
    memberId,
    kind: "area-imported",
    payload: {
      version: 1,
      areaId: area.id,
      number: area.number,
      fileName: area.fileName,
      fileSha256: area.fileSha256,
      sourceCrs: report.crs.text,
      vertices: report.vertices,
      geodesicAreaM2: report.geodesicAreaM2,
      mended: [...report.mended],
    },
  });
  const frame = framesOf(tx, ctx.surveyId)[0];
  if (frame) keepDraft(tx, ctx, surveyId, { ...specOf(frame), areaId: area.id });
}
