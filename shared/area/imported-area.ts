import type { Crs } from "#shared/projection/crs.ts";
import type { Position } from "#shared/projection/transformer.ts";

/** A ring without a repeated last vertex; its last edge runs back to the first vertex. */
export type SourceRing = readonly Position[];
/** The outer ring (counter-clockwise), then holes (clockwise). */
export type SourcePolygon = readonly SourceRing[];

/** A study area that passed all checks, in the system of its file: edges are straight there (R1). */
export interface ImportedArea {
  readonly crs: Crs;
  readonly polygons: readonly SourcePolygon[];
}
