/** Room around the map for the margin's figures, in px. */
export interface SheetMargins {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
  /** A phone's width: no graticule, the scale bar inside the sheet. */
  readonly compact: boolean;
}

export function marginsFor(width: number, graticule: boolean): SheetMargins {
  if (width < 560) return { left: 26, right: 12, top: 26, bottom: 12, compact: true };
  return { left: 36, right: graticule ? 36 : 12, top: 34, bottom: graticule ? 34 : 12, compact: false };
}
