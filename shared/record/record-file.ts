import * as z from "zod/mini";
import { Problem } from "#shared/problem.ts";

export const RECORD_FORMAT = "quillet-record/1";

/** More text than this is not read: a season's record of 100,000 counts is about 100 MB. */
export const MOST_RECORD_CHARACTERS = 300_000_000;

const id = z.string().check(z.minLength(1), z.maxLength(100));
const sha256 = z.string().check(z.regex(/^[0-9a-f]{64}$/, "is not a SHA-256 in lower-case hexadecimal"));
const utc = z.iso.datetime();
const text = z.string();
const unit = z.int().check(z.gte(1));
const position = z.int().check(z.gte(1));
/** Shapes that have a schema of their own, checked where they are used. */
const object = z.record(z.string(), z.unknown());

const role = z.enum(["planner", "lead", "counter", "auditor"]);
const closingState = z.enum(["refused", "unsafe", "not-reached", "lost"]);
const visitState = z.enum(["counted", "not-in-population", "refused", "unsafe", "not-reached", "lost"]);
/** Who ended something, when and why. `member` is the opaque id that `people` gives a name. */
const ending = z.nullable(z.strictObject({ reason: text, at: utc, member: id }));

const survey = z.strictObject({
  id,
  name: text,
  /** IANA name: days are those of the people there. */
  timeZone: text,
  /** Confidence level as decimal text. */
  level: text,
  createdAt: utc,
  targets: z.array(z.strictObject({ id, singular: text, plural: text, countingRule: text, wholeNumbers: z.boolean() })),
  seasons: z.array(z.strictObject({ id, name: text, startsOn: z.nullable(text), endsOn: z.nullable(text) })),
});

const area = z.strictObject({
  id,
  number: z.int(),
  fileName: text,
  fileSha256: sha256,
  /** The source's CRS as the text that conversions use. */
  sourceCrs: text,
  report: object,
  importedAt: utc,
  member: id,
});

const frame = z.strictObject({
  id,
  number: z.int(),
  areaId: id,
  /** quillet-frame/1, as it was hashed. */
  statement: object,
  sealedAt: utc,
  member: id,
});

const declaration = z.strictObject({
  id,
  seasonId: id,
  frameId: id,
  /** quillet-declaration/1, as it was hashed. */
  declaration: object,
  sha256,
  declaredAt: utc,
  member: id,
  seed: z.nullable(
    z.strictObject({
      text,
      source: z.enum(["made-here", "typed", "dice", "two-parts", "pulse"]),
      at: utc,
      member: id,
    }),
  ),
  abandoned: ending,
});

const entry = z.strictObject({
  position,
  unit,
  column: z.int(),
  row: z.int(),
  label: text,
  repeatOf: z.nullable(position),
  reserve: z.boolean(),
});

const draw = z.strictObject({
  id,
  number: z.int(),
  declarationId: id,
  frameId: id,
  drawnAt: utc,
  member: id,
  /** One list a stratum; without strata one list whose stratum is the empty text. */
  lists: z.array(z.strictObject({ stratum: text, entries: z.array(entry) })),
  withdrawn: ending,
});

const seasonDraw = z.strictObject({ id, seasonId: id, drawId: id, takenAt: utc, endedAt: z.nullable(utc) });

const pickAct = z.strictObject({
  drawId: id,
  seasonId: id,
  /** From 1 within a draw and season. */
  sequence: z.int(),
  /** As shared/field/in-use.ts has them. */
  kind: z.enum(["close", "close-counted", "reopen", "add"]),
  stratum: text,
  /** close, close-counted, reopen: the unit whose picks are meant. */
  unit: z.nullable(unit),
  /** add: how many entries are opened. */
  count: z.nullable(z.int()),
  state: z.nullable(closingState),
  reason: text,
  at: utc,
  member: id,
});

const visit = z.strictObject({ id, seasonId: id, frameId: id, unit, column: z.int(), row: z.int(), openedAt: utc });

const assignment = z.strictObject({ visitId: id, member: id, day: text, assignedAt: utc });

const countImport = z.strictObject({ id, fileName: text, sha256, written: z.int(), importedAt: utc, member: id });

const count = z.strictObject({
  id,
  visitId: id,
  targetId: id,
  /** Who counted. */
  observer: id,
  purpose: z.enum(["first", "recount", "pass", "other-observer"]),
  state: visitState,
  value: z.nullable(z.number().check(z.gte(0))),
  /** The entry that this one takes the place of; that one stays in the list. */
  replaces: z.nullable(id),
  reason: text,
  note: text,
  importId: z.nullable(id),
  /** Who wrote it down here. */
  enteredBy: id,
  enteredAt: utc,
  madeAt: utc,
});

const estimate = z.strictObject({
  id,
  targetId: id,
  seasonId: id,
  settings: object,
  result: object,
  keptAt: utc,
  member: id,
});

const event = z.strictObject({
  envelope: z.strictObject({
    format: z.literal("quillet-event/1"),
    survey: id,
    sequence: z.int(),
    at: utc,
    member: id,
    kind: z.string(),
    previous: sha256,
    payloadSha256: sha256,
  }),
  salt: z.string().check(z.regex(/^[0-9a-f]{32}$/, "is not 32 characters of lower-case hexadecimal")),
  /** By kind: see events.ts. */
  payload: object,
  sha256,
  signature: z.string().check(z.regex(/^[0-9a-f]{128}$/, "is not a signature in lower-case hexadecimal")),
});

/**
 * The record file (rule R9): all that a replay needs, in one JSON value, and nothing that tells where people live or
 * how to reach them. Strict: an unknown member is refused, because a replay that passes over something would say more
 * than it checked. Every list is oldest first.
 */
export const recordFile = z.strictObject({
  format: z.literal(RECORD_FORMAT),
  exportedAt: utc,
  software: z.strictObject({ name: text, version: text }),
  survey,
  /** Ed25519, hexadecimal: signs every event. */
  publicKey: sha256,
  /** Told by the installation when the record was saved: its other surveys with the same boundary file or frame (rule R7). */
  elsewhere: z.strictObject({ sameSource: z.int().check(z.gte(0)), sameFrame: z.int().check(z.gte(0)) }),
  people: z.array(z.strictObject({ member: id, name: text, roles: z.array(role) })),
  areas: z.array(area),
  frames: z.array(frame),
  declarations: z.array(declaration),
  draws: z.array(draw),
  seasonDraws: z.array(seasonDraw),
  pickActs: z.array(pickAct),
  visits: z.array(visit),
  assignments: z.array(assignment),
  countImports: z.array(countImport),
  counts: z.array(count),
  estimates: z.array(estimate),
  events: z.array(event),
});
export type RecordFile = z.infer<typeof recordFile>;

/**
 * Reads a record file.
 * @throws Problem `record-invalid` that names the first place that is not as the format says.
 */
export function parseRecordFile(text: string): RecordFile {
  if (text.length > MOST_RECORD_CHARACTERS) {
    throw new Problem("record-invalid", "The file has more than 300 million characters. Choose a record file.");
  }
  let value: unknown;
  try {
    value = JSON.parse(text.replace(/^\uFEFF/, ""));
  } catch (error) {
    throw new Problem("record-invalid", `The file is not JSON: ${(error as Error).message}. Save the record again.`);
  }
  return readRecord(value);
}

/** The same for a value that was parsed already. @throws Problem `record-invalid` */
export function readRecord(value: unknown): RecordFile {
  const result = recordFile.safeParse(value);
  if (result.success) return result.data;
  const format = typeof value === "object" && value !== null && "format" in value ? value.format : undefined;
  if (format !== RECORD_FORMAT) {
    throw new Problem(
      "record-invalid",
      `format: expected "${RECORD_FORMAT}", found ${shown(format)}. Choose a record file that Quillet saved.`,
    );
  }
  const [issue] = result.error.issues;
  if (issue === undefined) throw new RangeError("a refusal without an issue");
  throw new Problem("record-invalid", `${pathText(issue.path)}: ${issueText(issue, valueAt(value, issue.path))}.`);
}

function issueText(issue: z.core.$ZodIssue, found: unknown): string {
  if (issue.code === "unrecognized_keys") return `unknown member ${issue.keys.map(shown).join(", ")}`;
  if (issue.code === "invalid_type") return `expected ${issue.expected}, found ${shown(found)}`;
  if (issue.code === "invalid_value") {
    return `expected ${issue.values.map((value) => shown(value)).join(" or ")}, found ${shown(found)}`;
  }
  if (issue.code === "too_small") return `expected at least ${String(issue.minimum)}, found ${shown(found)}`;
  if (issue.code === "invalid_format" && issue.format === "datetime") {
    return `expected a time in UTC, found ${shown(found)}`;
  }
  return `${shown(found)} ${issue.code === "invalid_format" ? issue.message : "is not as the format says"}`;
}

function valueAt(value: unknown, path: readonly PropertyKey[]): unknown {
  return path.reduce<unknown>(
    (inner, key) =>
      typeof inner === "object" && inner !== null ? (inner as Readonly<Record<PropertyKey, unknown>>)[key] : undefined,
    value,
  );
}

/** "counts[3].value", as people write it. */
function pathText(path: readonly PropertyKey[]): string {
  if (path.length === 0) return "the file";
  return path
    .map((part, at) => (typeof part === "number" ? `[${part}]` : `${at === 0 ? "" : "."}${String(part)}`))
    .join("");
}

function shown(value: unknown): string {
  if (value === undefined) return "nothing";
  const text = JSON.stringify(value);
  return text.length <= 60 ? text : `${text.slice(0, 59)}…`;
}
