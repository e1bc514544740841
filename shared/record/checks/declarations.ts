import { canonicalSha256 } from "#shared/record/chain.ts";
import {
  type Check,
  counted,
  differ,
  type Difference,
  firstDifference,
  notChecked,
  type ReplayRun,
  verdict,
} from "./check.ts";
import { type Declared, declaredOf } from "./declared.ts";

const TITLE = "What was declared is what was hashed";

/**
 * Each declaration has the hash that its event sealed, of a frame of this record. Its hash covers frame, design with all
 * its numbers, generator, reserves, limits, level and the seed's source, so none of these can have been chosen later.
 */
export function checkDeclarations(run: ReplayRun): Check[] {
  const declared = declaredOf(run.record, run.events);
  const broken = run.events.brokenAmong(["draw-declared"]);
  if (broken !== null) return [notChecked("declarations", TITLE, `Not compared: ${broken} is not whole.`)];
  if (declared.length === 0) return [notChecked("declarations", TITLE, "Nothing is declared yet.")];
  const difference = firstDifference(declared.map((one) => () => compare(run, one)));
  return [verdict("declarations", TITLE, difference, counted(declared.length, "declaration"))];
}

function compare(run: ReplayRun, { name, stored, value }: Declared): Difference | null {
  const event = run.events.of("draw-declared").find(({ payload }) => payload.declarationId === stored.id);
  const frame = run.frames.get(stored.frameId);
  return firstDifference([
    () => differ(`${name}, hash of the declaration`, stored.sha256, canonicalSha256(stored.declaration)),
    () => differ(`${name}, hash in its event`, stored.sha256, event?.payload.declarationSha256),
    () => (value === null ? { where: name, found: "another format", expected: "quillet-declaration/1" } : null),
    () => differ(`${name}, survey`, value?.surveyId, run.record.survey.id),
    () => differ(`${name}, season`, value?.seasonId, stored.seasonId),
    () => differ(`${name}, hash of the frame`, value?.frameSha256, frame?.sealedSha256),
    () => differ(`${name}, frame of its event`, stored.frameId, event?.payload.frameId),
    () => differ(`${name}, declared at`, stored.declaredAt, event?.at),
    () => differ(`${name}, declared by`, stored.member, event?.member),
  ]);
}
