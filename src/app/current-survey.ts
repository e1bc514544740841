import { createContext, use } from "react";
import type { Survey } from "#shared/api/surveys.ts";

export const CurrentSurveyContext = createContext<Survey | null>(null);

/** The survey of this page, with the roles that this person holds in it. Throws outside of a survey's pages. */
export function useCurrentSurvey(): Survey {
  const survey = use(CurrentSurveyContext);
  if (survey === null) throw new RangeError("this page stands outside of a survey");
  return survey;
}
