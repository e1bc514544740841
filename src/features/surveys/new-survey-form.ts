import * as z from "zod/mini";

const said = (message: string) =>
  z.string().check(z.trim(), z.minLength(1, message), z.maxLength(200, "Use at most 200 characters."));
const notes = z.string().check(z.trim(), z.maxLength(4000, "Use at most 4 000 characters."));

/** What the form holds; the contract checks the same once more on the server. */
export const newSurveyForm = z.object({
  name: said("Give the survey a name: the place is usually best."),
  targetSingular: said("Write what one of them is called: “spike”."),
  targetPlural: said("Write what several are called: “spikes”."),
  countingRule: notes,
  wholeNumbers: z.enum(["whole", "measured"]),
  seasonName: said("Name the season, for example by its year."),
  timeZone: said("Choose the time zone of the place."),
  safetyNotes: notes,
});
export type NewSurveyFields = z.infer<typeof newSurveyForm>;

/** Good starting values: the year and the time zone of this computer. */
export function newSurveyDefaults(now: Date, timeZone: string): NewSurveyFields {
  return {
    name: "",
    targetSingular: "",
    targetPlural: "",
    countingRule: "",
    wholeNumbers: "whole",
    seasonName: String(now.getFullYear()),
    timeZone,
    safetyNotes: "",
  };
}
