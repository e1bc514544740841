import type { CellCount } from "#shared/counts/count.ts";
import type { EstimateResult, EstimatedDesign, LimitKind } from "./result.ts";

/** One entry of the draw. */
export interface Pick {
  readonly order: number;
  readonly unit: number;
  readonly label: string;
}

export interface EstimateInput {
  readonly design: EstimatedDesign;
  /** N, the units in the frame. */
  readonly units: number;
  /** The picks in use, in draw order; a cell that was picked twice stands here twice. */
  readonly picks: readonly Pick[];
  /** Closed picks, and reserves that were passed over because they fell on a closed cell. */
  readonly closedPicks: readonly Pick[];
  /** What is known of each unit; a unit that is not in here was not visited yet. */
  readonly counts: ReadonlyMap<number, CellCount>;
  /** Units that were amended from a count to a closed state, with the count that was in force before. */
  readonly countedBefore: ReadonlyMap<number, number>;
  readonly countIn: "inside" | "whole";
  /** The area that the counts speak for in m² (density.ts), or "none" for a list without areas. */
  readonly areaM2: number | "none";
  /** Confidence level as a share, 0.95. */
  readonly level: number;
  /** The limits to be printed large, as declared with the draw. */
  readonly limits: LimitKind;
}

export function estimateFromCounts(input: EstimateInput): EstimateResult {
  throw new RangeError(`not built yet: ${input.design}`);
}
