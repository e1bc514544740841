import type { Stage } from "#shared/api/surveys.ts";

/** Patterns for the router. */
export const patterns = {
  signIn: "/sign-in",
  invitation: "/invitation/:secret",
  askForReset: "/reset",
  reset: "/reset/:secret",
  surveys: "/surveys",
  newSurvey: "/surveys/new",
  survey: "/surveys/:surveyId",
  stage: "/surveys/:surveyId/:stage",
  people: "/surveys/:surveyId/people",
  account: "/account",
  installation: "/installation",
  replay: "/replay",
} as const;

/** Every address of the app, filled in. */
export const paths = {
  home: "/surveys",
  signIn: patterns.signIn,
  askForReset: patterns.askForReset,
  surveys: patterns.surveys,
  newSurvey: patterns.newSurvey,
  account: patterns.account,
  installation: patterns.installation,
  replay: patterns.replay,
  survey: (surveyId: string) => `/surveys/${encodeURIComponent(surveyId)}`,
  stage: (surveyId: string, stage: Stage) => `/surveys/${encodeURIComponent(surveyId)}/${stage}`,
  people: (surveyId: string) => `/surveys/${encodeURIComponent(surveyId)}/people`,
  settings: (surveyId: string) => `/surveys/${encodeURIComponent(surveyId)}/settings`,
} as const;
