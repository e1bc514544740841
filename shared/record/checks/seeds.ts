import { seedSourceSentence } from "#shared/draw/declaration.ts";
import { quotedSeed } from "#shared/draw/seed.ts";
import { type Check, differ, type Difference, firstDifference, notChecked, type ReplayRun, verdict } from "./check.ts";
import { type Declared, declaredOf, nameOf } from "./declared.ts";

/** Each seed is the one in its event, from the source that was declared; and what that source shows is said. */
export function checkSeeds(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong(["seed-given"]);
  const given = new Set(run.events.of("seed-given").map(({ payload }) => payload.declarationId));
  return declaredOf(run.record, run.events)
    .filter(({ stored }) => stored.seed !== null || given.has(stored.id))
    .map((declared) => {
      const id = `seed-${declared.number}`;
      const title = `The seed of ${declared.name} is the one that was given`;
      if (broken !== null) return notChecked(id, title, `Not compared: ${broken} is not whole.`);
      return verdict(id, title, compare(run, declared), detail(run, declared));
    });
}

function compare(run: ReplayRun, { name, stored, value }: Declared): Difference | null {
  const event = run.events.of("seed-given").find(({ payload }) => payload.declarationId === stored.id);
  const { seed } = stored;
  return firstDifference([
    () => differ(`${name}, seed`, seed?.text, event?.payload.seed),
    () => differ(`${name}, source of the seed`, seed?.source, event?.payload.source),
    () =>
      value === null ? null : differ(`${name}, source of the seed as declared`, seed?.source, value.seedSource.kind),
    () => differ(`${name}, seed given at`, seed?.at, event?.at),
    () => differ(`${name}, seed given by`, seed?.member, event?.member),
  ]);
}

function detail(run: ReplayRun, declared: Declared): string {
  const { stored, value } = declared;
  if (stored.seed === null || value === null) return "Its declaration is not the one that was sealed.";
  const name = nameOf(run.record, stored.seed.member);
  return `${quotedSeed(stored.seed.text)}. ${seedSourceSentence(value.seedSource, name)}${usedBefore(run, declared)}`;
}

/** Names the earlier declarations whose list begins with the same cells, since frame, generator and seed are the same. */
function usedBefore(run: ReplayRun, { stored, value, seed }: Declared): string {
  const all = declaredOf(run.record, run.events);
  const same = all
    .slice(
      0,
      all.findIndex((one) => one.stored.id === stored.id),
    )
    .filter((one) => one.seed === seed && one.value?.frameSha256 === value?.frameSha256)
    .filter((one) => one.value !== null && one.value.generator === value?.generator)
    .map(({ name }) => name);
  return same.length === 0 ? "" : ` The same seed on the same frame as ${same.join(" and ")}: the same cells.`;
}
