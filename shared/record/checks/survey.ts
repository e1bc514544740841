import type { SettingsPayload } from "#shared/record/events.ts";
import type { RecordFile } from "#shared/record/record-file.ts";
import {
  type Check,
  counted,
  differ,
  differInMembers,
  type Difference,
  firstDifference,
  notChecked,
  type ReplayRun,
  verdict,
} from "./check.ts";

const TITLE = "Names, target and people are those of the events";

const KINDS = ["survey-created", "settings-changed", "member-added", "role-ended", "member-renamed"] as const;

/**
 * The survey's name, time zone and level, its target and season, and everybody's name and roles, are as the events leave
 * them; and each change of the settings begins with what stood before it. No event adds a target or a season.
 */
export function checkSurvey(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong(KINDS);
  if (broken !== null) return [notChecked("survey", TITLE, `Not compared: ${broken} is not whole.`)];
  const { survey, people } = run.record;
  const [created] = run.events.of("survey-created");
  if (created === undefined) return [notChecked("survey", TITLE, "No event says how the survey began.")];
  const changes = run.events.of("settings-changed");
  const began: Settings = {
    ...created.payload,
    targets: [created.payload.target],
    season: { ...created.payload.season, startsOn: null, endsOn: null },
  };
  const settings = changes.at(-1)?.payload.after ?? began;
  const difference = firstDifference([
    () => differ("survey, created", survey.createdAt, created.at),
    ...changes.map(({ payload, sequence }, place) => () => {
      const before = changes[place - 1]?.payload.after ?? began;
      return settingsDifference(`settings before event ${sequence}`, payload.before, before);
    }),
    () => settingsDifference("survey", settingsOf(survey), settings),
    () => differ("survey, its seasons", namesOf(survey.seasons), settings.season.name),
    () => peopleDifference(run),
  ]);
  const said = `${settings.name}; ${settings.targets.map(({ plural }) => plural).join(", ")}`;
  const changed = changes.length === 0 ? "" : `; settings changed ${counted(changes.length, "time")}`;
  return [verdict("survey", TITLE, difference, `${said}; ${counted(people.length, "person", "people")}${changed}`)];
}

/** What the record holds of the settings. */
type Settings = Pick<SettingsPayload, "name" | "timeZone" | "level" | "targets" | "season">;

function settingsOf({ name, timeZone, level, targets, seasons }: RecordFile["survey"]): Settings {
  const season = seasons[0] ?? { id: "", name: "", startsOn: null, endsOn: null };
  return { name, timeZone, level, targets, season };
}

function settingsDifference(where: string, found: Settings, expected: Settings): Difference | null {
  const { name, timeZone, level, targets, season } = expected;
  return firstDifference([
    () => differInMembers(where, { ...found }, { name, timeZone, level }),
    () =>
      differ(
        `${where}, its targets`,
        found.targets.map(({ singular }) => singular).join(", "),
        targets.map(({ singular }) => singular).join(", "),
      ),
    ...targets.map(
      (target, place) => () => differInMembers(`target ${target.singular}`, { ...found.targets[place] }, target),
    ),
    () => differInMembers(`season ${season.name}`, found.season, season),
  ]);
}

function namesOf(list: readonly { readonly name: string }[]): string {
  return list.map(({ name }) => name).join(", ");
}

function peopleDifference(run: ReplayRun): Difference | null {
  const roles = new Map<string, Set<string>>();
  const names = new Map<string, string>();
  for (const event of peopleEvents(run)) {
    const { member } = event.payload;
    const held = roles.get(member) ?? new Set();
    roles.set(member, held);
    if ("after" in event.payload) names.set(member, event.payload.after);
    else names.set(member, event.payload.name);
    if (!("role" in event.payload)) continue;
    if (event.ends) held.delete(event.payload.role);
    else held.add(event.payload.role);
  }
  for (const person of run.record.people) {
    const known = roles.get(person.member);
    if (known === undefined) {
      if (person.roles.length === 0) continue; // an owner who added people without a role of their own
      return { where: person.name, found: person.roles.join(", "), expected: "no role: no event gives one" };
    }
    const difference = firstDifference([
      () => differ(`member ${person.member}, name`, person.name, names.get(person.member)),
      () => differ(`${person.name}, roles`, person.roles.toSorted().join(", "), [...known].toSorted().join(", ")),
    ]);
    if (difference !== null) return difference;
    roles.delete(person.member);
  }
  const [missing] = roles.keys();
  return missing === undefined ? null : { where: "people", found: "nobody", expected: names.get(missing) ?? missing };
}

/** What gives and takes roles and changes names, in the order of the chain. */
function peopleEvents({ events }: ReplayRun) {
  return [
    ...events.of("member-added").map((event) => ({ ...event, ends: false })),
    ...events.of("role-ended").map((event) => ({ ...event, ends: true })),
    ...events.of("member-renamed").map((event) => ({ ...event, ends: false })),
  ].toSorted((a, b) => a.sequence - b.sequence);
}
