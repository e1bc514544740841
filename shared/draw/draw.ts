import { checkDesign, withReplacement, type Design } from "./design.ts";
import { generatorNamed, type Generator, type GeneratorName } from "./generator.ts";
import { checkSeed } from "./seed.ts";

/** One entry of a stratum's list, in stream order. */
export interface Entry {
  /** 1, 2, 3 … within the stratum; never renumbered. */
  readonly position: number;
  /** Number of the unit in the frame's list, 1 … N. */
  readonly unit: number;
  /** Position of the earliest entry with the same unit, if there is one before this. */
  readonly repeatOf: number | null;
  /** Whether it stands behind the first n. */
  readonly reserve: boolean;
}

/** One list a stratum; without strata one list whose stratum is the empty text. */
export type DrawEntries = readonly { readonly stratum: string; readonly entries: readonly Entry[] }[];

/** Told now and then how far the work is; what it throws ends the work. */
export type DrawProgress = (done: number, of: number) => void;

const TELL_EVERY = 1024;

/** The first `length` entries of simple random sampling from `units` units: `next(units) + 1`, repeats skipped where they can't stand. */
function simpleEntries(
  generator: Generator,
  units: number,
  repeatsStand: boolean,
  picks: number,
  length: number,
  onProgress?: DrawProgress,
): Entry[] {
  const firstPosition = new Map<number, number>();
  const entries: Entry[] = [];
  for (let calls = 0; entries.length < length; calls += 1) {
    if (calls % TELL_EVERY === 0) onProgress?.(entries.length, length);
    const unit = generator.next(units) + 1;
    const repeatOf = firstPosition.get(unit) ?? null;
    if (repeatOf !== null && !repeatsStand) continue;
    const position = entries.length + 1;
    if (repeatOf === null) firstPosition.set(unit, position);
    entries.push({ position, unit, repeatOf, reserve: position > picks });
  }
  onProgress?.(length, length);
  return entries;
}

/**
 * The draw (rule R6): a pure function of frame, design, seed and generator. The first n entries of a list are picks, the
 * next `reserves` reserves, all from one stream; so a longer list begins with the shorter one, and a list that runs
 * short is lengthened by calling this again with more reserves.
 * @throws Problem `design-invalid` or `seed-invalid`; whatever `onProgress` throws.
 */
export function drawEntries(
  frame: { readonly sha256: string; readonly units: number },
  design: Design,
  seed: string,
  generatorName: GeneratorName,
  reserves: number,
  onProgress?: DrawProgress,
): DrawEntries {
  checkDesign(design, frame.units, reserves);
  const generator = generatorNamed(generatorName, frame.sha256, checkSeed(seed), "");
  switch (design.kind) {
    case "srs-wr":
    case "srs-wor": {
      const repeatsStand = withReplacement(design.kind);
      const length = design.n + reserves;
      return [
        { stratum: "", entries: simpleEntries(generator, frame.units, repeatsStand, design.n, length, onProgress) },
      ];
    }
  }
}

/**
 * How many reserves a lengthened list may have, at most those wanted: without replacement a list ends with the frame's
 * last cell.
 */
export function lengthenedReserves(design: Design, units: number, wanted: number): number {
  return withReplacement(design.kind) ? wanted : Math.min(wanted, units - design.n);
}

/** How many different units the entries hold. */
export function distinctUnits(entries: Iterable<Entry>): number {
  const units = new Set<number>();
  for (const entry of entries) units.add(entry.unit);
  return units.size;
}
