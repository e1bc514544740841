import type { RecordFile } from "#shared/record/record-file.ts";
import { RECORD_FORMAT } from "#shared/record/record-file.ts";
import { publicKeyOf } from "#shared/record/sign.ts";
import { type AreaHead, areasOf } from "../db/areas.ts";
import type { Platform } from "../context.ts";
import { type CountRow, entriesOfSurvey, importsOf } from "../db/counts.ts";
import {
  type DeclarationState,
  declarationsOf,
  drawsOf,
  type DrawState,
  entriesOf,
  seasonDrawsOf,
} from "../db/draws.ts";
import { elsewhereOf } from "../db/elsewhere.ts";
import { keptEstimatesOf } from "../db/estimates.ts";
import { allEvents, type EventRow } from "../db/events.ts";
import { findFrame, framesOf } from "../db/frames.ts";
import { memberNames, membersOf } from "../db/members.ts";
import type { Reader } from "../db/open.ts";
import { findSurvey, seasonsOf, targetsOf } from "../db/surveys.ts";
import { allPickActs, assignmentsOf, type PickActRow, visitsOf } from "../db/visits.ts";

type Part<K extends keyof RecordFile> = RecordFile[K] extends (infer T)[] ? T : never;

/** The record file of a survey (rule R9): all that a replay needs, every list oldest first. */
export function buildRecord(
  platform: Pick<Platform, "db" | "now" | "signingKey" | "version">,
  surveyId: string,
): RecordFile {
  const { db } = platform;
  return {
    format: RECORD_FORMAT,
    exportedAt: platform.now().toISOString(),
    software: { name: "Quillet", version: platform.version },
    survey: surveyPart(db, surveyId),
    publicKey: publicKeyOf(platform.signingKey),
    elsewhere: elsewhereOf(db, surveyId),
    people: peoplePart(db, surveyId),
    areas: areasOf(db, surveyId).toReversed().map(areaPart),
    frames: framesPart(db, surveyId),
    declarations: declarationsOf(db, surveyId).toReversed().map(declarationPart),
    draws: drawsOf(db, surveyId)
      .toReversed()
      .map((state) => drawPart(db, state)),
    seasonDraws: seasonDrawsOf(db, surveyId),
    pickActs: allPickActs(db, surveyId).map(pickActPart),
    visits: visitsOf(db, surveyId).map(({ id, seasonId, frameVersionId, unit, column, row, openedAt }) => ({
      ...{ id, seasonId, frameId: frameVersionId, unit, column, row, openedAt },
    })),
    assignments: assignmentsOf(db, surveyId).map(({ visitId, memberId, day, assignedAt }) => ({
      ...{ visitId, member: memberId, day, assignedAt },
    })),
    countImports: importsOf(db, surveyId).map(({ id, fileName, sha256, written, importedAt, importedBy }) => ({
      ...{ id, fileName, sha256, written, importedAt, member: importedBy },
    })),
    counts: entriesOfSurvey(db, surveyId).map(countPart),
    estimates: estimatesPart(db, surveyId),
    events: allEvents(db, surveyId).map(eventPart),
  };
}

function surveyPart(reader: Reader, surveyId: string): RecordFile["survey"] {
  const survey = findSurvey(reader, surveyId);
  if (!survey) throw new Error(`survey ${surveyId} vanished`);
  const { id, name, timeZone, level, createdAt } = survey;
  return {
    ...{ id, name, timeZone, level, createdAt },
    targets: targetsOf(reader, surveyId).map((target) => ({
      id: target.id,
      singular: target.singular,
      plural: target.plural,
      countingRule: target.countingRule,
      wholeNumbers: target.wholeNumbers,
    })),
    seasons: seasonsOf(reader, surveyId).map((season) => ({
      id: season.id,
      name: season.name,
      startsOn: season.startsOn,
      endsOn: season.endsOn,
    })),
  };
}

/** Names and roles, never an address. Somebody without a role any more, or an owner who never had one, stays named. */
function peoplePart(reader: Reader, surveyId: string): Part<"people">[] {
  const roles = membersOf(reader, surveyId);
  return [...memberNames(reader, surveyId)].map(([member, name]) => ({
    member,
    name,
    roles: roles.filter((row) => row.id === member).map((row) => row.role),
  }));
}

function areaPart(area: AreaHead): Part<"areas"> {
  const report = area.report as { readonly crs: { readonly text: string } } & Record<string, unknown>;
  return {
    id: area.id,
    number: area.number,
    fileName: area.fileName,
    fileSha256: area.fileSha256,
    sourceCrs: report.crs.text,
    report,
    importedAt: area.createdAt,
    member: area.importedBy,
  };
}

/** Sealed frames only: a draft is nobody's evidence. */
function framesPart(reader: Reader, surveyId: string): Part<"frames">[] {
  return framesOf(reader, surveyId)
    .toReversed()
    .flatMap((head) => {
      const frame = findFrame(reader, head.id);
      if (!frame?.statement || frame.sealedAt === null || frame.sealedBy === null) return [];
      return {
        id: frame.id,
        number: frame.number,
        areaId: frame.areaVersionId,
        statement: JSON.parse(frame.statement) as Record<string, unknown>,
        sealedAt: frame.sealedAt,
        member: frame.sealedBy,
      };
    });
}

function declarationPart({ declaration, seed, abandoned }: DeclarationState): Part<"declarations"> {
  return {
    id: declaration.id,
    seasonId: declaration.seasonId,
    frameId: declaration.frameVersionId,
    declaration: JSON.parse(declaration.text) as Record<string, unknown>,
    sha256: declaration.sha256,
    declaredAt: declaration.declaredAt,
    member: declaration.declaredBy,
    seed: seed && { text: seed.text, source: seed.source, at: seed.givenAt, member: seed.givenBy },
    abandoned: abandoned && { reason: abandoned.reason, at: abandoned.abandonedAt, member: abandoned.abandonedBy },
  };
}

function drawPart(reader: Reader, { draw, withdrawn }: DrawState): Part<"draws"> {
  const lists = new Map<string, Part<"draws">["lists"][number]["entries"]>();
  for (const { stratum, position, unit, column, row, label, repeatOf, reserve } of entriesOf(reader, draw.id)) {
    const entry = { position, unit, column, row, label, repeatOf, reserve };
    const list = lists.get(stratum);
    if (list) list.push(entry);
    else lists.set(stratum, [entry]);
  }
  return {
    id: draw.id,
    number: draw.number,
    declarationId: draw.declarationId,
    frameId: draw.frameVersionId,
    drawnAt: draw.drawnAt,
    member: draw.drawnBy,
    lists: [...lists].map(([stratum, entries]) => ({ stratum, entries })),
    withdrawn: withdrawn && { reason: withdrawn.reason, at: withdrawn.withdrawnAt, member: withdrawn.withdrawnBy },
  };
}

function pickActPart({ actedBy, actedAt, ...act }: PickActRow): Part<"pickActs"> {
  const { drawId, seasonId, sequence, kind, stratum, unit, count, state, reason } = act;
  return { drawId, seasonId, sequence, kind, stratum, unit, count, state, reason, at: actedAt, member: actedBy };
}

function countPart({ observerId, ...row }: CountRow): Part<"counts"> {
  const { id, visitId, targetId, purpose, state, value, replaces, reason, note, importId } = row;
  const { enteredBy, enteredAt, madeAt } = row;
  return {
    ...{ id, visitId, targetId, observer: observerId, purpose, state, value, replaces, reason, note, importId },
    ...{ enteredBy, enteredAt, madeAt },
  };
}

function estimatesPart(reader: Reader, surveyId: string): Part<"estimates">[] {
  return keptEstimatesOf(reader, surveyId).map(({ id, targetId, seasonId, settings, result, keptAt, keptBy }) => ({
    ...{ id, targetId, seasonId, keptAt, member: keptBy },
    settings: settings as Record<string, unknown>,
    result: result as Record<string, unknown>,
  }));
}

function eventPart(row: EventRow): Part<"events"> {
  return {
    envelope: {
      format: "quillet-event/1",
      survey: row.surveyId,
      sequence: row.sequence,
      at: row.at,
      member: row.memberId,
      kind: row.kind,
      previous: row.previousSha256,
      payloadSha256: row.payloadSha256,
    },
    salt: row.salt,
    payload: JSON.parse(row.payload) as Record<string, unknown>,
    sha256: row.sha256,
    signature: row.signature,
  };
}
