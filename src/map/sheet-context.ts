import { createContext, use } from "react";
import type { PlaneBounds, SheetScale } from "./sheet-geometry.ts";

/** Layers of the sheet in their order from below. Cells lie between "tint" and "hole" as canvas tiles. */
export type SheetSlot = "tint" | "hole" | "fill" | "drawn" | "boundary" | "figures" | "chosen";

/** What changes when the sheet is zoomed or has come to rest after a pan, not while it is being dragged. */
export interface SheetView extends SheetScale {
  readonly width: number;
  readonly height: number;
  /** What is in sight, and half as much again on each side, in metres. */
  readonly near: PlaneBounds;
}

export interface Sheet {
  readonly view: SheetView;
  /** The SVG group of each slot, in px from the view's anchor. */
  readonly slot: (name: SheetSlot) => SVGGElement | null;
  /** Makes names that are one of a kind in the page, for clip paths and patterns. */
  readonly id: string;
  /** Tells the sheet what a press on a place does; the newest listener that takes it wins. */
  readonly onPress: (listener: PressListener) => () => void;
}

/** A press on the sheet, in metres; true where the listener took it. */
export type PressListener = (east: number, north: number) => boolean;

export const SheetContext = createContext<Sheet | null>(null);

/** The sheet around a layer. Throws where there is none. */
export function useSheet(): Sheet {
  const sheet = use(SheetContext);
  if (sheet === null) throw new RangeError("a layer stands outside of a SheetMap");
  return sheet;
}
