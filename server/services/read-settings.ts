import type { SurveySettings } from "#shared/api/settings.ts";
import type { Reader } from "../db/open.ts";
import { currentSeason, findSurvey, targetsOf } from "../db/surveys.ts";

/** What is set for a survey, for its season in work and for its targets. */
export function readSettings(reader: Reader, surveyId: string): SurveySettings {
  const survey = findSurvey(reader, surveyId);
  if (!survey) throw new Error(`survey ${surveyId} vanished`);
  const { name, timeZone, level, sensitivity, safetyNotes } = survey;
  const season = currentSeason(reader, surveyId);
  return {
    ...{ name, timeZone, level, sensitivity, safetyNotes },
    targets: targetsOf(reader, surveyId).map(({ id, singular, plural, countingRule, wholeNumbers }) => ({
      ...{ id, singular, plural, countingRule, wholeNumbers },
    })),
    season: { id: season.id, name: season.name, startsOn: season.startsOn, endsOn: season.endsOn },
  };
}
