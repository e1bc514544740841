/** Numbers that carry their unit in the type, so that metres can't be added to degrees or hectares to square metres. */
declare const unit: unique symbol;
type Unit<Name extends string> = number & { readonly [unit]: Name };

export type SquareMetres = Unit<"m2">;
/** Whole billionths of a cell's area (R3): 1 000 000 000 is a whole cell. */
export type Billionths = Unit<"1e-9">;

export const squareMetres = (value: number): SquareMetres => value as SquareMetres;
export const billionths = (value: number): Billionths => value as Billionths;

/** A place on the globe in WGS 84 degrees. */
export interface LngLat {
  readonly lng: number;
  readonly lat: number;
}

/** A place on a frame's projected plane, in whole millimetres. */
export interface GridPoint {
  readonly eastMm: number;
  readonly northMm: number;
}

export const SQUARE_METRES_PER_HECTARE = 10_000;
export const WHOLE_CELL = 1_000_000_000 as Billionths;
