/**
 * Query keys begin with what an act can make stale: everything of one survey lies under `surveyKey(id)`, so that after any act
 * `invalidateQueries({ queryKey: surveyKey(id) })` is enough. Each word adds its own name: `surveyKey(id, "area")`.
 */
export const sessionKey = ["session"] as const;

export const surveysKey = ["surveys"] as const;

export function surveyKey(surveyId: string, ...rest: readonly (string | number)[]): readonly (string | number)[] {
  return ["survey", surveyId, ...rest];
}

/** What never changes once it is there (sealed cells, files): not touched by acts on the survey. */
export function foreverKey(surveyId: string, ...rest: readonly unknown[]): readonly unknown[] {
  return ["forever", surveyId, ...rest];
}
