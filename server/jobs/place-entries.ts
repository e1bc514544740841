import type { Design } from "#shared/draw/design.ts";
import { drawEntries } from "#shared/draw/draw.ts";
import type { GeneratorName } from "#shared/draw/generator.ts";
import { labelOf, unitAt } from "#shared/frame/list.ts";
import { unpackCells } from "#shared/frame/pack.ts";

export interface EntriesTask {
  readonly frame: { readonly sha256: string; readonly units: number };
  /** The frame's packed cells. */
  readonly cells: Uint8Array;
  readonly design: Design;
  readonly seed: string;
  readonly generator: GeneratorName;
  readonly reserves: number;
}

export interface PlacedEntry {
  readonly stratum: string;
  readonly position: number;
  readonly unit: number;
  readonly column: number;
  readonly row: number;
  readonly label: string;
  readonly repeatOf: number | null;
  readonly reserve: boolean;
}

/** The entries of a draw with their places in the lattice and their labels. Pure: the same here and in a worker. */
export function placeEntries(task: EntriesTask): PlacedEntry[] {
  const cells = unpackCells(task.cells);
  return drawEntries(task.frame, task.design, task.seed, task.generator, task.reserves).flatMap(
    ({ stratum, entries }) =>
      entries.map((entry) => {
        const { column, row } = unitAt(cells, entry.unit);
        return { stratum, ...entry, column, row, label: labelOf(cells, column, row) };
      }),
  );
}
