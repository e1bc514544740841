import { Problem } from "#shared/problem.ts";

const LOWEST = 0.5;
const HIGHEST = 0.9999;

/**
 * The confidence level as a share, if limits can be computed for it.
 * @throws Problem `input-invalid` outside 0.5 … 0.9999.
 */
export function checkLevel(level: number): number {
  if (level >= LOWEST && level <= HIGHEST) return level;
  if (level === 1) {
    throw new Problem("input-invalid", "No limits are 100 % sure. Give a level such as 0.95.");
  }
  throw new Problem("input-invalid", `A level of ${level} cannot be used. Give one from 0.5 to 0.9999, such as 0.95.`);
}

/**
 * A confidence level as people write it: 0.95, 95, "95 %", "0,95".
 * @throws Problem `input-invalid` for anything else, 100 % and 0 among it.
 */
export function readLevel(text: string): number {
  const found = /^(\d+(?:[.,]\d+)?)\s*(%?)$/.exec(text.trim());
  const value = Number(found?.[1]?.replace(",", ".") ?? Number.NaN);
  if (found === null || Number.isNaN(value)) {
    throw new Problem("input-invalid", `“${text}” is no confidence level. Give one such as 0.95 or 95 %.`);
  }
  const percent = found[2] === "%" || value > 1;
  // Through decimal text: 99.9 / 100 alone is not the double nearest to 0.999.
  return checkLevel(percent ? Number((value / 100).toPrecision(12)) : value);
}

/** A level as per cent, "95" or "99.9", without the sign. */
export function levelPercent(level: number): string {
  return String(Number((level * 100).toPrecision(10)));
}
