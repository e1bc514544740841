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

/**
 * The survey's name, time zone and level, its one target and one season, and everybody's name and roles, are as the
 * events say. No event gives a season days or adds a target or season.
 */
export function checkSurvey(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong(["survey-created", "member-added"]);
  if (broken !== null) return [notChecked("survey", TITLE, `Not compared: ${broken} is not whole.`)];
  const { survey, people } = run.record;
  const [created] = run.events.of("survey-created");
  if (created === undefined) return [notChecked("survey", TITLE, "No event says how the survey began.")];
  const { name, target, season, timeZone, level } = created.payload;
  const difference = firstDifference([
    () => differInMembers("survey", survey, { name, timeZone, level, createdAt: created.at }),
    () => differInMembers(`target ${target.singular}`, survey.targets.find(({ id }) => id === target.id) ?? {}, target),
    () =>
      differInMembers(`season ${season.name}`, survey.seasons.find(({ id }) => id === season.id) ?? {}, {
        ...season,
        startsOn: null,
        endsOn: null,
      }),
    () => differ("survey, its targets", survey.targets.map(({ singular }) => singular).join(", "), target.singular),
    () => differ("survey, its seasons", survey.seasons.map((one) => one.name).join(", "), season.name),
    () => peopleDifference(run),
  ]);
  return [
    verdict("survey", TITLE, difference, `${name}; ${target.plural}; ${counted(people.length, "person", "people")}`),
  ];
}

function peopleDifference(run: ReplayRun): Difference | null {
  const roles = new Map<string, Set<string>>();
  const names = new Map<string, string>();
  for (const { payload } of run.events.of("member-added")) {
    names.set(payload.member, payload.name);
    roles.set(payload.member, (roles.get(payload.member) ?? new Set()).add(payload.role));
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
