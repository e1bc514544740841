import * as z from "zod/mini";
import { none, sha256Hex, surveyParams, utc } from "#shared/api/common.ts";
import { contract, json, stream } from "#shared/api/contract.ts";

/** One line of the record as people read it; `payload` is what was hashed, by kind (shared/record/events.ts). */
export const recordEvent = z.object({
  sequence: z.int(),
  at: utc,
  kind: z.string(),
  memberId: z.string(),
  by: z.string(),
  sha256: sha256Hex,
  payload: z.record(z.string(), z.unknown()),
});
export type RecordEvent = z.infer<typeof recordEvent>;

export const listEvents = contract({
  name: "listEvents",
  method: "GET",
  path: "/api/surveys/:surveyId/events",
  guard: "record.read",
  summary: "All that happened, newest first",
  params: surveyParams,
  query: z.object({ before: z.optional(z.string().check(z.regex(/^\d{1,12}$/))) }),
  body: none,
  answer: json(
    z.object({
      events: z.array(recordEvent),
      newest: z.object({ sequence: z.int(), sha256: sha256Hex }),
      keyFingerprint: sha256Hex,
      /** Other surveys of this installation with the same boundary file or the same frame. */
      elsewhere: z.object({ sameSource: z.int(), sameFrame: z.int() }),
      more: z.boolean(),
    }),
  ),
});

export const readRecordFile = contract({
  name: "readRecordFile",
  method: "GET",
  path: "/api/surveys/:surveyId/record",
  guard: "record.read",
  summary: "The record file (quillet-record/1): all that a replay needs",
  params: surveyParams,
  query: none,
  body: none,
  answer: stream("application/json"),
});

export const readSchema = contract({
  name: "readSchema",
  method: "GET",
  path: "/api/schemas/:name",
  guard: "public",
  summary: "JSON Schema of a stored format: quillet-frame-1 or quillet-record-1",
  params: z.object({ name: z.enum(["quillet-frame-1", "quillet-record-1"]) }),
  query: none,
  body: none,
  answer: stream("application/schema+json"),
});

export const readOpenApi = contract({
  name: "readOpenApi",
  method: "GET",
  path: "/api/openapi.json",
  guard: "public",
  summary: "This interface as OpenAPI",
  params: none,
  query: none,
  body: none,
  answer: stream("application/json"),
});

export const health = contract({
  name: "health",
  method: "GET",
  path: "/health",
  guard: "public",
  summary: "The process answers",
  params: none,
  query: none,
  body: none,
  answer: json(z.object({ status: z.literal("up"), version: z.string() })),
});

export const ready = contract({
  name: "ready",
  method: "GET",
  path: "/ready",
  guard: "public",
  summary: "The database answers",
  params: none,
  query: none,
  body: none,
  answer: json(z.object({ status: z.literal("ready") })),
});
