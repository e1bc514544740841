import * as z from "zod/mini";
import { id, longText, none, role, shortText, surveyParams, utc } from "#shared/api/common.ts";
import { contract, json } from "#shared/api/contract.ts";
import { ownersWaiting, waitingThing } from "#shared/api/waiting.ts";

export const STAGES = ["area", "frame", "plan", "draw", "field", "counts", "estimate", "record"] as const;
export type Stage = (typeof STAGES)[number];

/** A stage at a glance; `note` is the line under its name: "version 2, sealed". */
export const stageState = z.object({
  stage: z.enum(STAGES),
  state: z.enum(["not-started", "in-work", "attention", "done"]),
  note: z.string(),
});
export type StageState = z.infer<typeof stageState>;

export const season = z.object({ id, name: z.string(), position: z.int() });
export const target = z.object({
  id,
  singular: z.string(),
  plural: z.string(),
  countingRule: z.string(),
  wholeNumbers: z.boolean(),
});

export const surveySummary = z.object({
  id,
  name: z.string(),
  target: z.string(),
  season: z.string(),
  roles: z.array(role),
  stages: z.array(stageState),
  /** Outline for a thumbnail in degrees, or null while there is no boundary. */
  outline: z.nullable(z.array(z.array(z.array(z.tuple([z.number(), z.number()]))))),
  createdAt: utc,
  /** Since when nothing can be changed; null for a survey in work. */
  archivedAt: z.nullable(utc),
});
export type SurveySummary = z.infer<typeof surveySummary>;

/** A survey on the list of surveys. */
export const listedSurvey = z.extend(surveySummary, {
  /** For those who may read the record. */
  newestEvent: z.nullable(z.object({ sequence: z.int(), at: utc })),
  /** What it waits for of whoever asks; nothing while it is archived. */
  waiting: z.array(waitingThing),
});
export type ListedSurvey = z.infer<typeof listedSurvey>;

export const survey = z.extend(surveySummary, {
  timeZone: z.string(),
  level: z.string(),
  safetyNotes: z.string(),
  seasons: z.array(season),
  targets: z.array(target),
  /** The opaque id under which this person acts in the record. */
  memberId: z.nullable(id),
});
export type Survey = z.infer<typeof survey>;

export const listSurveys = contract({
  name: "listSurveys",
  method: "GET",
  path: "/api/surveys",
  guard: "signed-in",
  summary: "The surveys in which I hold a role, archived ones too, and what waits for me",
  params: none,
  query: none,
  body: none,
  answer: json(
    z.object({
      surveys: z.array(listedSurvey),
      /** For an owner of the installation; null for others. */
      installation: z.nullable(ownersWaiting),
    }),
  ),
});

export const otherSurvey = z.object({ id, name: z.string(), createdAt: utc });
export type OtherSurvey = z.infer<typeof otherSurvey>;

export const listOtherSurveys = contract({
  name: "listOtherSurveys",
  method: "GET",
  path: "/api/installation/surveys",
  guard: "owner",
  summary: "The surveys of this installation in which I hold no role",
  params: none,
  query: none,
  body: none,
  answer: json(z.object({ surveys: z.array(otherSurvey) })),
});

export const createSurvey = contract({
  name: "createSurvey",
  method: "POST",
  path: "/api/surveys",
  guard: "signed-in",
  summary: "Start a survey; whoever starts it is its planner",
  params: none,
  query: none,
  body: z.object({
    name: shortText,
    targetSingular: shortText,
    targetPlural: shortText,
    countingRule: longText,
    wholeNumbers: z.boolean(),
    seasonName: shortText,
    timeZone: shortText,
    safetyNotes: longText,
  }),
  answer: json(survey),
});

export const readSurvey = contract({
  name: "readSurvey",
  method: "GET",
  path: "/api/surveys/:surveyId",
  guard: "survey.see",
  summary: "One survey with the state of its stages",
  params: surveyParams,
  query: none,
  body: none,
  answer: json(survey),
});
