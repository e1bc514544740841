/** What a cell's square can show: the states of a visit, with zero apart from the other counts. */
export type VisitMarkState =
  "not-visited" | "counted" | "zero" | "refused" | "unsafe" | "not-reached" | "lost" | "not-in-population";

export const VISIT_STATE_WORDS: Readonly<Record<VisitMarkState, string>> = {
  "not-visited": "not visited yet",
  counted: "counted",
  zero: "zero",
  refused: "refused",
  unsafe: "unsafe",
  "not-reached": "not reached",
  lost: "lost",
  "not-in-population": "not in the population",
};
