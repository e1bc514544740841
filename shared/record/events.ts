import * as z from "zod/mini";

/**
 * What can happen to a survey, one shape a kind. Stored for ever: add kinds and versions, never change an old one.
 * Units are numbers of the frame's list; ids are those of the database; texts are as they were typed.
 */
const id = z.string();
const sha256 = z.string().check(z.regex(/^[0-9a-f]{64}$/));
const v1 = z.literal(1);
const visitState = z.enum(["counted", "not-in-population", "refused", "unsafe", "not-reached", "lost"]);

export const countPayload = z.object({
  version: v1,
  entryId: id,
  visitId: id,
  frameId: id,
  unit: z.int(),
  targetId: id,
  observer: id,
  purpose: z.enum(["first", "recount", "pass", "other-observer"]),
  state: visitState,
  value: z.nullable(z.number()),
  replaces: z.nullable(id),
  reason: z.string(),
  note: z.string(),
  madeAt: z.string(),
  importId: z.nullable(id),
});
export type CountPayload = z.infer<typeof countPayload>;

/** The settings of a survey whole, as they were before and after a change. */
export const settingsPayload = z.object({
  name: z.string(),
  timeZone: z.string(),
  level: z.string(),
  sensitivity: z.string(),
  safetyNotes: z.string(),
  targets: z.array(
    z.object({
      id,
      singular: z.string(),
      plural: z.string(),
      countingRule: z.string(),
      wholeNumbers: z.boolean(),
    }),
  ),
  season: z.object({ id, name: z.string(), startsOn: z.nullable(z.string()), endsOn: z.nullable(z.string()) }),
});
export type SettingsPayload = z.infer<typeof settingsPayload>;

export const EVENT_PAYLOADS = {
  "survey-created": z.object({
    version: v1,
    name: z.string(),
    target: z.object({
      id,
      singular: z.string(),
      plural: z.string(),
      countingRule: z.string(),
      wholeNumbers: z.boolean(),
    }),
    season: z.object({ id, name: z.string() }),
    timeZone: z.string(),
    level: z.string(),
  }),
  "member-added": z.object({ version: v1, member: id, name: z.string(), role: z.string() }),
  /** Somebody no longer holds a role; after the last of them they are no longer in the survey. */
  "role-ended": z.object({ version: v1, member: id, name: z.string(), role: z.string() }),
  "member-renamed": z.object({ version: v1, member: id, before: z.string(), after: z.string() }),
  "settings-changed": z.object({ version: v1, before: settingsPayload, after: settingsPayload }),
  "survey-archived": z.object({ version: v1 }),
  "survey-unarchived": z.object({ version: v1 }),
  /** This survey was begun as a copy of another's settings and boundary, whose record then ended with that hash. */
  "survey-copied": z.object({ version: v1, from: id, newestSha256: sha256 }),
  "area-imported": z.object({
    version: v1,
    areaId: id,
    number: z.int(),
    fileName: z.string(),
    fileSha256: sha256,
    sourceCrs: z.string(),
    vertices: z.int(),
    geodesicAreaM2: z.number(),
    mended: z.array(z.string()),
  }),
  "frame-sealed": z.object({
    version: v1,
    frameId: id,
    number: z.int(),
    areaId: id,
    frameSha256: sha256,
    listSha256: sha256,
    units: z.int(),
  }),
  "draw-declared": z.object({ version: v1, declarationId: id, declarationSha256: sha256, frameId: id }),
  "declaration-abandoned": z.object({ version: v1, declarationId: id, reason: z.string() }),
  "seed-given": z.object({ version: v1, declarationId: id, source: z.string(), seed: z.string() }),
  "draw-made": z.object({
    version: v1,
    drawId: id,
    number: z.int(),
    declarationId: id,
    picks: z.int(),
    reserves: z.int(),
    /** SHA-256 of the entries, one line each: stratum,position,unit and a newline. */
    entriesSha256: sha256,
  }),
  /** A list that ran short, lengthened by the same stream for the act that follows. */
  "list-lengthened": z.object({
    version: v1,
    drawId: id,
    stratum: z.string(),
    /** Entries of this stratum before and after, picks and reserves together. */
    from: z.int(),
    to: z.int(),
    /** SHA-256 of all entries of this stratum, as in draw-made. */
    entriesSha256: sha256,
  }),
  "draw-withdrawn": z.object({ version: v1, drawId: id, reason: z.string() }),
  "cells-assigned": z.object({
    version: v1,
    frameId: id,
    units: z.array(z.int()),
    member: z.nullable(id),
    day: z.string(),
  }),
  "waypoints-exported": z.object({
    version: v1,
    drawId: id,
    format: z.enum(["gpx", "csv"]),
    cells: z.int(),
    nameLength: z.int(),
    fileSha256: sha256,
  }),
  "pick-closed": z.object({
    version: v1,
    drawId: id,
    stratum: z.string(),
    unit: z.int(),
    state: z.enum(["refused", "unsafe", "not-reached", "lost"]),
    reason: z.string(),
    closed: z.array(z.int()),
    opened: z.array(z.int()),
    passedOver: z.array(z.int()),
  }),
  "count-entered": countPayload,
  "count-amended": countPayload,
  "counts-imported": z.discriminatedUnion("version", [
    z.object({
      version: v1,
      importId: id,
      fileName: z.string(),
      fileSha256: sha256,
      written: z.int(),
    }),
    z.object({
      version: z.literal(2),
      importId: id,
      fileName: z.string(),
      fileSha256: sha256,
      written: z.int(),
      /** The order of day and month by which the file's dates were read; null where none needed it. */
      dateOrder: z.nullable(z.enum(["day-first", "month-first"])),
      /** Names in the file that a person said are a member's, or the same as another spelling. */
      merged: z.array(
        z.union([z.object({ written: z.string(), member: id }), z.object({ written: z.string(), name: z.string() })]),
      ),
    }),
  ]),
  "estimate-kept": z.object({ version: v1, estimateId: id, targetId: id, seasonId: id, resultSha256: sha256 }),
} as const;

export type EventKind = keyof typeof EVENT_PAYLOADS;
export type EventPayload<K extends EventKind> = z.infer<(typeof EVENT_PAYLOADS)[K]>;

export function isEventKind(kind: string): kind is EventKind {
  return Object.hasOwn(EVENT_PAYLOADS, kind);
}
