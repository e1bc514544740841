import type { SurveySettings } from "#shared/api/settings.ts";
import { SENSITIVITIES } from "#shared/api/settings.ts";
import { levelPercent, readLevel } from "#shared/estimate/level.ts";
import { problemOf } from "../../api/problem-of.ts";
import type { ComparedField } from "../../components/ui/two-versions.ts";

/**
 * The settings as they are typed, by the name of their field; those of a target begin with its id: "t1 plural". One flat
 * text each, so that two versions can be held against each other.
 */
export type SettingsFields = Readonly<Record<string, string>>;

export type Sensitivity = SurveySettings["sensitivity"];

/** What each step asks of people. */
export const SENSITIVITY_TEXTS: Readonly<Record<Sensitivity, { readonly title: string; readonly text: string }>> = {
  open: { title: "Open", text: "Anybody may know the places: nobody can do harm with them." },
  low: {
    title: "Low",
    text: "Places are for the people of the survey; elsewhere they are told by the name of the area.",
  },
  medium: {
    title: "Medium",
    text: "Exact places could do harm: waypoints and sheets go to crews only, and come back.",
  },
  high: {
    title: "High",
    text: "Exact places would do harm (nests, rare plants, finds): nobody passes on anything that shows a cell.",
  },
};

export const isSensitivity = (text: string): text is Sensitivity => SENSITIVITIES.some((one) => one === text);

export const fieldText = (fields: SettingsFields, name: string): string => fields[name] ?? "";

export function fieldsOf(settings: SurveySettings): SettingsFields {
  const { name, timeZone, level, sensitivity, safetyNotes, season, targets } = settings;
  return {
    name,
    timeZone,
    level: levelPercent(Number(level)),
    sensitivity,
    safetyNotes,
    season: season.name,
    startsOn: season.startsOn ?? "",
    endsOn: season.endsOn ?? "",
    ...Object.fromEntries(
      targets.flatMap(({ id, singular, plural, countingRule, wholeNumbers }) => [
        [`${id} singular`, singular],
        [`${id} plural`, plural],
        [`${id} rule`, countingRule],
        [`${id} counts`, wholeNumbers ? "whole" : "measured"],
      ]),
    ),
  };
}

const NEEDED: Readonly<Record<string, string>> = {
  name: "Give the survey a name: the place is usually best.",
  season: "Name the season, for example by its year.",
};

/** What is wrong, by the name of its field. */
export type FieldErrors = Readonly<Partial<Record<string, string>>>;

export function errorsOf(fields: SettingsFields, settings: SurveySettings): FieldErrors {
  const errors: Record<string, string> = {};
  for (const [name, message] of Object.entries(NEEDED))
    if (fieldText(fields, name).trim() === "") errors[name] = message;
  for (const { id } of settings.targets) {
    if (fieldText(fields, `${id} singular`).trim() === "") {
      errors[`${id} singular`] = "Write what one of them is called: “spike”.";
    }
    if (fieldText(fields, `${id} plural`).trim() === "") {
      errors[`${id} plural`] = "Write what several are called: “spikes”.";
    }
  }
  const [startsOn, endsOn] = [fieldText(fields, "startsOn"), fieldText(fields, "endsOn")];
  if (startsOn !== "" && endsOn !== "" && endsOn < startsOn) {
    errors["endsOn"] = "The season ends before it starts: mend one of the two days.";
  }
  try {
    readLevel(fieldText(fields, "level"));
  } catch (error) {
    errors["level"] = problemOf(error).message;
  }
  return errors;
}

/** What is sent. Throws the Problem of a level that cannot be read. */
export function settingsOf(fields: SettingsFields, settings: SurveySettings): SurveySettings {
  const text = (name: string) => fieldText(fields, name).trim();
  const day = (name: string) => (text(name) === "" ? null : text(name));
  const sensitivity = text("sensitivity");
  return {
    name: text("name"),
    timeZone: text("timeZone"),
    level: String(readLevel(text("level"))),
    sensitivity: isSensitivity(sensitivity) ? sensitivity : settings.sensitivity,
    safetyNotes: text("safetyNotes"),
    targets: settings.targets.map(({ id }) => ({
      id,
      singular: text(`${id} singular`),
      plural: text(`${id} plural`),
      countingRule: text(`${id} rule`),
      wholeNumbers: text(`${id} counts`) === "whole",
    })),
    season: { id: settings.season.id, name: text("season"), startsOn: day("startsOn"), endsOn: day("endsOn") },
  };
}

export const COUNTS = {
  whole: "a whole number of things",
  measured: "a measured amount, with decimals",
} as const;

/** Every field with its label and how it reads, in the order of the page. */
export function comparedFields(settings: SurveySettings): ComparedField<SettingsFields>[] {
  const plain = (key: string, label: string): ComparedField<SettingsFields> => ({
    key,
    label,
    text: (fields) => fieldText(fields, key).trim(),
  });
  const several = settings.targets.length > 1;
  return [
    plain("name", "Name of the survey"),
    plain("season", "Season"),
    plain("startsOn", "First day"),
    plain("endsOn", "Last day"),
    { key: "timeZone", label: "Time zone of the place", text: (fields) => zoneText(fieldText(fields, "timeZone")) },
    ...settings.targets.flatMap(({ id, plural }) => {
      const of = several ? `, ${plural}` : "";
      return [
        plain(`${id} singular`, `One of what is counted${of}`),
        plain(`${id} plural`, `Several of them${of}`),
        plain(`${id} rule`, `Counting rule${of}`),
        {
          key: `${id} counts`,
          label: `A count is${of}`,
          text: (fields: SettingsFields) =>
            fieldText(fields, `${id} counts`) === "whole" ? COUNTS.whole : COUNTS.measured,
        },
      ];
    }),
    { key: "level", label: "Confidence level", text: (fields) => `${fieldText(fields, "level").trim()}\u00a0%` },
    {
      key: "sensitivity",
      label: "Sensitivity",
      text: (fields) => {
        const step = fieldText(fields, "sensitivity");
        return isSensitivity(step) ? SENSITIVITY_TEXTS[step].title : step;
      },
    },
    plain("safetyNotes", "Safety notes"),
  ];
}

export const zoneText = (zone: string): string => zone.replaceAll("_", " ");
