import * as z from "zod/mini";
import { Problem } from "#shared/problem.ts";

/** The most entries of one kind, picks or reserves, that one list may hold. */
export const MOST_PICKS = 100_000;
/** The fewest reserves that are offered. */
const FEWEST_RESERVES = 5;

const picks = z.int();

/**
 * The designs that can be drawn. A kind that joins later (stratified, systematic, spatially balanced, proportional to
 * area) joins this union, and the switches over `kind` name every place that has to know it.
 */
export const design = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("srs-wr"), n: picks }),
  z.strictObject({ kind: z.literal("srs-wor"), n: picks }),
]);
export type Design = z.infer<typeof design>;
export type DesignKind = Design["kind"];
/** Simple random sampling of n picks, with replacement ("srs-wr", the default) or without ("srs-wor"). */
export type SimpleDesign = Extract<Design, { kind: "srs-wr" | "srs-wor" }>;

/** Whether a cell can be picked more than once. */
export function withReplacement(kind: DesignKind): boolean {
  switch (kind) {
    case "srs-wr":
      return true;
    case "srs-wor":
      return false;
  }
}

/**
 * How many reserves are offered for n picks: a fifth of n, rounded up, and at least 5; never more than `room`
 * (without replacement: N − n).
 */
export function reserveDefault(n: number, room = MOST_PICKS): number {
  return Math.max(0, Math.min(Math.max(FEWEST_RESERVES, Math.ceil(n / 5)), room, MOST_PICKS));
}

/**
 * The design, if it can be drawn from a list of that many units with that many reserves.
 * @throws Problem `design-invalid` that names the number and the limit.
 */
export function checkDesign(wanted: Design, units: number, reserves: number): Design {
  if (!Number.isSafeInteger(units) || units < 1) throw new RangeError(`a frame has at least one unit, got ${units}`);
  if (!Number.isSafeInteger(wanted.n) || wanted.n < 1 || wanted.n > MOST_PICKS) {
    throw new Problem("design-invalid", `${wanted.n} picks cannot be drawn. Give a whole number from 1 to 100,000.`);
  }
  if (!Number.isSafeInteger(reserves) || reserves < 0 || reserves > MOST_PICKS) {
    throw new Problem("design-invalid", `${reserves} reserves cannot be drawn. Give a whole number from 0 to 100,000.`);
  }
  if (!withReplacement(wanted.kind) && wanted.n + reserves > units) {
    const asked = reserves === 0 ? `${wanted.n} picks` : `${wanted.n} picks and ${reserves} reserves`;
    throw new Problem(
      "design-invalid",
      `Without replacement ${asked} need ${wanted.n + reserves} different cells, and the frame has ${units}. ` +
        "Ask for fewer, or draw with replacement.",
    );
  }
  return wanted;
}

/** What a planner should know about a design that can be drawn. */
export function designNotes(wanted: Design, units: number): string[] {
  const notes: string[] = [];
  if (wanted.n === 1) notes.push("One pick gives a mean and no standard error: at least 2 picks are needed for one.");
  if (wanted.n >= units) {
    notes.push(
      withReplacement(wanted.kind)
        ? `There are only ${units} cells: counting each of them once is less work than ${wanted.n} picks, and exact.`
        : "Every cell is picked: this is a complete count, and its standard error is 0.",
    );
  }
  return notes;
}
