import type { Platform } from "../context.ts";

/**
 * A whole number in 0 … m − 1, each with the same chance, from the operating system's random source: bytes beyond the
 * last whole multiple of m are thrown away. m is 1 … 256.
 */
export function randomBelow(platform: Pick<Platform, "random">, m: number): number {
  if (!Number.isInteger(m) || m < 1 || m > 256) throw new RangeError(`needs a whole number from 1 to 256, got ${m}`);
  const usable = 256 - (256 % m);
  for (;;) {
    const [byte] = platform.random(1);
    if (byte === undefined) throw new Error("the random source gave nothing");
    if (byte < usable) return byte % m;
  }
}
