import type { Position } from "#shared/projection/transformer.ts";

/** How a file says where its coordinates are; "missing" carries what it lacks, in a sentence. */
export type StatedCrs =
  | {
      readonly kind: "stated";
      readonly text: string;
      readonly howKnown: string;
      /** False where only the format's rule says it, and the file itself says nothing: then an answer goes before it. */
      readonly byFile: boolean;
    }
  | { readonly kind: "missing"; readonly why: string };

/** A line that may be meant as a boundary; it is closed to a ring only where somebody says so. */
export interface FoundLine {
  /** As the file names it, or what it is and its number: "line 3". */
  readonly name: string;
  readonly vertices: readonly Position[];
}

/** What a reader took from a file, before anything is checked: rings as they came, closed or not. */
export interface FoundPolygons {
  readonly format: string;
  readonly crs: StatedCrs;
  readonly features: number;
  /** [polygon][ring][vertex]; the first ring of a polygon is its outer one. */
  readonly polygons: readonly (readonly (readonly Position[])[])[];
  readonly lines: readonly FoundLine[];
  readonly others: { readonly points: number; readonly lines: number; readonly empty: number };
  /** Vertices that had a third or further coordinate. */
  readonly heights: number;
  readonly mended: readonly string[];
  readonly ignored: readonly string[];
  readonly notes: readonly string[];
}
