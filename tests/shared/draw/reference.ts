import { readFileSync } from "node:fs";
import * as z from "zod/mini";

const read = (name: string): unknown =>
  JSON.parse(readFileSync(new URL(`../../reference/draws/${name}`, import.meta.url), "utf8"));

const drawCase = z.object({
  generator: z.enum(["sha256-counter", "arc4", "arc4-text"]),
  frameSha256: z.string(),
  seed_as_typed: z.string(),
  seed_normalised: z.string(),
  stratum: z.string(),
  N: z.int(),
  n: z.int(),
  units_with_replacement: z.array(z.int()),
  units_without_replacement: z.array(z.int()),
  k_of_units_without_replacement: z.array(z.int()),
});
const designCase = z.object({
  frame: z.string(),
  frameSha256: z.string(),
  design: z.string(),
  generator: z.enum(["sha256-counter", "arc4"]),
  seed: z.string(),
  n: z.unknown(),
  reserves: z.int(),
  order_unit: z.array(z.tuple([z.string(), z.int(), z.int(), z.nullable(z.int()), z.nullable(z.int()), z.boolean()])),
});
const hashRow = z.object({ message: z.string(), N: z.int(), sha256: z.string(), index: z.int() });

/** 270 draws by an independent program in Python, checked with openssl and the npm package. */
export const drawCases = z.object({ cases: z.array(drawCase) }).parse(read("draws.json")).cases;
/** Draws of whole designs, reserves included, by another independent program in Python. */
export const designs = z
  .object({ lists: z.record(z.string(), z.string()), cases: z.array(designCase) })
  .parse(read("designs.json"));
export const hashes = z
  .object({
    published_vectors: z.array(z.object({ message: z.string(), sha256: z.string() })),
    rows: z.array(hashRow),
  })
  .parse(read("sha256.json"));
export const seedrandomValues = z
  .object({
    seeds: z.array(z.object({ seed: z.string(), first10: z.array(z.number()), draws_N100_floor: z.array(z.int()) })),
  })
  .parse(read("seedrandom.json")).seeds;
