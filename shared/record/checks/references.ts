import { RECORD_FORMAT, type RecordFile } from "#shared/record/record-file.ts";
import { type Check, counted, type Difference, firstDifference, shown, verdict } from "./check.ts";

export const FORMAT_TITLE = `The record reads as ${RECORD_FORMAT}`;

/** Ids are unique in their list, and whatever names one finds it: without that nothing else can be followed. */
export function checkReferences(record: RecordFile): Check {
  const ids = {
    areas: idsOf(record.areas),
    frames: idsOf(record.frames),
    declarations: idsOf(record.declarations),
    draws: idsOf(record.draws),
    visits: idsOf(record.visits),
    counts: idsOf(record.counts),
    imports: idsOf(record.countImports),
    seasons: idsOf(record.survey.seasons),
    targets: idsOf(record.survey.targets),
    people: new Set(record.people.map(({ member }) => member)),
  };
  const difference = firstDifference([
    () => twice("areas", record.areas),
    () => twice("frames", record.frames),
    () => twice("declarations", record.declarations),
    () => twice("draws", record.draws),
    () => twice("visits", record.visits),
    () => twice("counts", record.counts),
    () => twice("estimates", record.estimates),
    () => twiceDrawn(record),
    () => lost("frames", "areaId", record.frames, ids.areas),
    () => lost("declarations", "frameId", record.declarations, ids.frames),
    () => lost("declarations", "seasonId", record.declarations, ids.seasons),
    () => lost("draws", "declarationId", record.draws, ids.declarations),
    () => lost("draws", "frameId", record.draws, ids.frames),
    () => lost("seasonDraws", "drawId", record.seasonDraws, ids.draws),
    () => lost("seasonDraws", "seasonId", record.seasonDraws, ids.seasons),
    () => lost("pickActs", "drawId", record.pickActs, ids.draws),
    () => lost("pickActs", "seasonId", record.pickActs, ids.seasons),
    () => lost("visits", "frameId", record.visits, ids.frames),
    () => lost("visits", "seasonId", record.visits, ids.seasons),
    () => lost("assignments", "visitId", record.assignments, ids.visits),
    () => lost("counts", "visitId", record.counts, ids.visits),
    () => lost("counts", "targetId", record.counts, ids.targets),
    () => lost("counts", "observer", record.counts, ids.people),
    () => lost("counts", "importId", record.counts, ids.imports),
    () => lost("estimates", "targetId", record.estimates, ids.targets),
    () => lost("estimates", "seasonId", record.estimates, ids.seasons),
  ]);
  const detail = `${counted(record.events.length, "event")}, ${counted(record.draws.length, "draw")}, ${counted(record.counts.length, "count")}; no unknown members`;
  return verdict("format", FORMAT_TITLE, difference, detail);
}

function idsOf(list: readonly { readonly id: string }[]): Set<string> {
  return new Set(list.map(({ id }) => id));
}

function twice(name: string, list: readonly { readonly id: string }[]): Difference | null {
  const seen = new Set<string>();
  for (const [place, { id }] of list.entries()) {
    if (seen.has(id)) return { where: `${name}[${place}].id`, found: shown(id), expected: "an id of its own" };
    seen.add(id);
  }
  return null;
}

function twiceDrawn(record: RecordFile): Difference | null {
  const seen = new Set<string>();
  for (const [place, { declarationId }] of record.draws.entries()) {
    if (seen.has(declarationId)) {
      return {
        where: `draws[${place}].declarationId`,
        found: shown(declarationId),
        expected: "a declaration of its own",
      };
    }
    seen.add(declarationId);
  }
  return null;
}

function lost<K extends string>(
  name: string,
  member: K,
  list: readonly Readonly<Record<K, string | null>>[],
  known: ReadonlySet<string>,
): Difference | null {
  for (const [place, item] of list.entries()) {
    const id = item[member];
    if (id !== null && !known.has(id)) {
      return { where: `${name}[${place}].${member}`, found: shown(id), expected: "an id that the record holds" };
    }
  }
  return null;
}
