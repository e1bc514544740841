/**
 * Query keys begin with what an act can make stale: everything of one survey lies under `surveyKey(id)`, so that after any act
 * `invalidateQueries({ queryKey: surveyKey(id) })` is enough. Each word adds its own name: `surveyKey(id, "area")`.
 */
export const sessionKey = ["session"] as const;

/** Whether whoever was signed in here left by their own choice; a session that ends otherwise leaves the page as it is. */
export const hasLeftKey = ["session", "left"] as const;

/** What belongs to an account rather than to a survey: where it is signed in. */
export const accountKey = ["account"] as const;

export const surveysKey = ["surveys"] as const;

export function surveyKey(surveyId: string, ...rest: readonly (string | number)[]): readonly (string | number)[] {
  return ["survey", surveyId, ...rest];
}

/** What never changes once it is there (sealed cells, files): not touched by acts on the survey. */
export function foreverKey(surveyId: string, ...rest: readonly unknown[]): readonly unknown[] {
  return ["forever", surveyId, ...rest];
}
