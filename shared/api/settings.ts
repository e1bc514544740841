import * as z from "zod/mini";
import { id, longText, none, shortText, surveyParams } from "#shared/api/common.ts";
import { contract, json } from "#shared/api/contract.ts";
import { survey } from "#shared/api/surveys.ts";

export const SENSITIVITIES = ["open", "low", "medium", "high"] as const;

const calendarDay = z.nullable(z.iso.date());

const targetSettings = z.object({
  id,
  singular: shortText,
  plural: shortText,
  /** What one object is, and what counts as one. */
  countingRule: longText,
  wholeNumbers: z.boolean(),
});

/** What a planner sets for a survey. The season is the one in work. */
export const surveySettings = z.object({
  name: shortText,
  timeZone: shortText,
  /** Decimal text: "0.95". */
  level: z.string().check(z.regex(/^0\.\d{1,6}$/, "is a share below 1, such as 0.95")),
  sensitivity: z.enum(SENSITIVITIES),
  safetyNotes: longText,
  targets: z.array(targetSettings).check(z.minLength(1), z.maxLength(20)),
  season: z.object({ id, name: shortText, startsOn: calendarDay, endsOn: calendarDay }),
});
export type SurveySettings = z.infer<typeof surveySettings>;

export const readSettings = contract({
  name: "readSettings",
  method: "GET",
  path: "/api/surveys/:surveyId/settings",
  guard: "survey.see",
  summary: "The settings of a survey, with an ETag",
  params: surveyParams,
  query: none,
  body: none,
  versioned: true,
  answer: json(surveySettings),
});

export const changeSettings = contract({
  name: "changeSettings",
  method: "PUT",
  path: "/api/surveys/:surveyId/settings",
  guard: "settings.change",
  summary: "Change the settings that were seen (If-Match); what changed is an event",
  params: surveyParams,
  query: none,
  body: surveySettings,
  versioned: true,
  answer: json(surveySettings),
});

export const archiveSurvey = contract({
  name: "archiveSurvey",
  method: "POST",
  path: "/api/surveys/:surveyId/archive",
  guard: "settings.change",
  summary: "Put a survey away: it can be read and takes nothing new",
  params: surveyParams,
  query: none,
  body: none,
  answer: json(survey),
});

export const unarchiveSurvey = contract({
  name: "unarchiveSurvey",
  method: "DELETE",
  path: "/api/surveys/:surveyId/archive",
  guard: "settings.change",
  summary: "Take a survey out of the archive",
  params: surveyParams,
  query: none,
  body: none,
  whenArchived: true,
  answer: json(survey),
});

export const deleteSurvey = contract({
  name: "deleteSurvey",
  method: "DELETE",
  path: "/api/surveys/:surveyId",
  guard: "settings.change",
  summary: "Delete a survey with all that belongs to it; its name is typed",
  params: surveyParams,
  query: none,
  body: z.object({ name: z.string().check(z.maxLength(200)) }),
  whenArchived: true,
  answer: json(none),
});

export const copySurvey = contract({
  name: "copySurvey",
  method: "POST",
  path: "/api/surveys/:surveyId/copies",
  guard: "settings.change",
  summary:
    "A new survey for a next season: settings, targets, boundary and cell settings, and its people where asked for",
  params: surveyParams,
  query: none,
  body: z.object({ name: shortText, seasonName: shortText, withPeople: z.boolean() }),
  whenArchived: true,
  answer: json(survey),
});
