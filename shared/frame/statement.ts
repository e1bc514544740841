import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, utf8ToBytes } from "@noble/hashes/utils.js";
import canonicalize from "canonicalize";
import * as z from "zod/mini";
import { FARTHEST_MM, ringsFromJson, ringsToJson, type PlaneArea } from "#shared/geometry/rings.ts";
import { Problem } from "#shared/problem.ts";
import { billionths, WHOLE_CELL } from "#shared/units/metric.ts";
import {
  checkCellSpec,
  checkMembership,
  LARGEST_SIDE_MM,
  type CellSpec,
  type CountIn,
  type Membership,
} from "./cell-spec.ts";
import { MOST_UNITS, type FrameCells, type MeasuredCells } from "./cells.ts";
import { listSha256 } from "./list.ts";
import { measureCells } from "./measure.ts";
import { inListOrder } from "./member.ts";
import { selectCells } from "./select.ts";
import type { Progress } from "./walk.ts";

export const FRAME_FORMAT = "quillet-frame/1";

const placeMm = z.int().check(z.gte(-FARTHEST_MM), z.lte(FARTHEST_MM));
const sideMm = z.int().check(z.gte(2), z.lte(LARGEST_SIDE_MM), z.multipleOf(2));
const sha256Hex = z.string().check(z.regex(/^[0-9a-f]{64}$/));
const ring = z.array(z.tuple([placeMm, placeMm])).check(z.minLength(3));
const share = z.int().check(z.gte(1), z.lte(WHOLE_CELL));

/** What a sealed frame is (rule R5): all that its list follows from, and the list's hash. Every number is whole and below 2⁵³. */
export const frameStatement = z.strictObject({
  format: z.literal(FRAME_FORMAT),
  kind: z.literal("grid"),
  /** As stored; the EPSG code where there is one. */
  crs: z.strictObject({ text: z.string().check(z.minLength(1)), epsg: z.nullable(z.int().check(z.gte(1))) }),
  /** The boundary file's hash and its own system; null where rings were given as such. */
  source: z.nullable(z.strictObject({ sha256: sha256Hex, crs: z.string() })),
  mending: z.array(z.string()),
  /** [polygon][ring][corner][x, y] in whole millimetres of the plane, noded, not closed. */
  rings: z.array(z.array(ring).check(z.minLength(1))).check(z.minLength(1)),
  zones: z.array(z.never()),
  cells: z.strictObject({
    shape: z.literal("rectangle"),
    widthMm: sideMm,
    heightMm: sideMm,
    originEastMm: placeMm,
    originNorthMm: placeMm,
    rotationMicroDegrees: z.literal(0),
  }),
  membership: z.discriminatedUnion("rule", [
    z.strictObject({ rule: z.literal("touch") }),
    z.strictObject({ rule: z.literal("centre") }),
    z.strictObject({ rule: z.literal("inside") }),
    z.strictObject({ rule: z.literal("share"), atLeast: share }),
  ]),
  countIn: z.enum(["inside", "whole"]),
  leftOut: z.array(z.strictObject({ column: z.int(), row: z.int(), reason: z.string().check(z.minLength(1)) })),
  /** Made before sealing, so that a withheld frame can't be found by trying. */
  salt: z.string().check(z.regex(/^[0-9a-f]{32}$/)),
  units: z.int().check(z.gte(1), z.lte(MOST_UNITS)),
  listSha256: sha256Hex,
});
export type FrameStatement = z.infer<typeof frameStatement>;

/** What a statement is built from; the rest follows. */
export interface StatementParts {
  readonly crs: { readonly text: string; readonly epsg: number | null };
  readonly source: { readonly sha256: string; readonly crs: string } | null;
  readonly mending: readonly string[];
  /** Noded rings on the plane of `crs`. */
  readonly area: PlaneArea;
  readonly spec: CellSpec;
  readonly membership: Membership;
  readonly countIn: CountIn;
  readonly leftOut: readonly { readonly column: number; readonly row: number; readonly reason: string }[];
  /** 32 hexadecimal characters from a random source. */
  readonly salt: string;
}

export interface BuiltStatement {
  readonly statement: FrameStatement;
  readonly measured: MeasuredCells;
  readonly cells: FrameCells;
}

/**
 * Makes the cells, their list's hash and the statement.
 * @throws Problem as `measureCells` and `selectCells`; a ZodError on parts that no statement may hold; what `onProgress` throws.
 */
export function buildStatement(parts: StatementParts, onProgress?: Progress): BuiltStatement {
  const spec = checkCellSpec(parts.spec);
  const membership = checkMembership(parts.membership);
  const measured = measureCells(parts.area, spec, onProgress);
  const cells = selectCells(measured, membership, parts.leftOut);
  let hashed = 0;
  const statement = frameStatement.parse({
    format: FRAME_FORMAT,
    kind: "grid",
    crs: { text: parts.crs.text, epsg: parts.crs.epsg },
    source: parts.source === null ? null : { sha256: parts.source.sha256, crs: parts.source.crs },
    mending: [...parts.mending],
    rings: ringsToJson(parts.area),
    zones: [],
    cells: spec,
    membership,
    countIn: parts.countIn,
    leftOut: inListOrder(parts.leftOut).map(({ column, row, reason }) => ({ column, row, reason })),
    salt: parts.salt,
    units: cells.units,
    listSha256: listSha256(cells, () => onProgress?.((hashed += 1), hashed + 1)),
  });
  return { statement, measured, cells };
}

/** The RFC 8785 (JCS) form: the text that is hashed, kept and handed out. Throws a ZodError on what is no statement. */
export function statementText(statement: FrameStatement): string {
  const text = canonicalize(frameStatement.parse(statement));
  if (text === undefined) throw new RangeError("a frame statement has a canonical form");
  return text;
}

/** `frameSha256`: SHA-256 of the statement's RFC 8785 form, in lower-case hexadecimal (rule R5). */
export function frameSha256(statement: FrameStatement): string {
  return bytesToHex(sha256(utf8ToBytes(statementText(statement))));
}

/**
 * Reads a statement's text.
 * @throws Problem `statement-invalid` that names the first member that is wrong.
 */
export function parseStatement(text: string): FrameStatement {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    throw new Problem("statement-invalid", "This is no JSON text. Take the statement file as it was saved.");
  }
  const parsed = frameStatement.safeParse(value);
  if (parsed.success) return parsed.data;
  const issue = parsed.error.issues[0];
  const where = issue === undefined || issue.path.length === 0 ? "The whole" : `"${issue.path.join(".")}"`;
  throw new Problem(
    "statement-invalid",
    `${where} is not as ${FRAME_FORMAT} asks: ${issue?.message ?? "another format"}. Take the statement file as it was saved.`,
  );
}

/** The membership of a statement, with its share as billionths. */
export function membershipOf({ membership }: FrameStatement): Membership {
  return membership.rule === "share"
    ? { rule: "share", atLeast: billionths(membership.atLeast) }
    : { rule: membership.rule };
}

/**
 * The cells again, from rings, cell spec, membership and cells left out alone; N and list hash of the statement are not looked at.
 * @throws Problem as `measureCells` and `selectCells`; a RangeError where the rings overlap.
 */
export function rebuildCells(statement: FrameStatement, onProgress?: Progress): FrameCells {
  const measured = measureCells(ringsFromJson(statement.rings), statement.cells, onProgress);
  return selectCells(measured, membershipOf(statement), statement.leftOut);
}
