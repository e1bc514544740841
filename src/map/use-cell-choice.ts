import { useEffect, useState } from "react";
import { useMap } from "react-leaflet";
import type { SheetCell } from "./cell-path.ts";
import { useSheet } from "./sheet-context.ts";
import { cellAt, type CellGrid } from "./sheet-geometry.ts";

/** The cell at a place, or where cells are small the one whose middle is nearest within 12 px; undefined where there is none. */
function cellNear<Cell extends SheetCell>(
  cells: readonly Cell[],
  grid: CellGrid,
  scale: number,
  east: number,
  north: number,
): Cell | undefined {
  const { column, row } = cellAt(grid, east, north);
  const hit = cells.find((cell) => cell.column === column && cell.row === row);
  if (hit !== undefined || (grid.widthMm / 1000) * scale >= 16) return hit;
  let best: Cell | undefined;
  let bestDistance = 12 / scale;
  for (const cell of cells) {
    const away = Math.max(
      Math.abs((grid.originEastMm + (cell.column + 0.5) * grid.widthMm) / 1000 - east),
      Math.abs((grid.originNorthMm + (cell.row + 0.5) * grid.heightMm) / 1000 - north),
    );
    if (away < bestDistance) {
      best = cell;
      bestDistance = away;
    }
  }
  return best;
}

/** Choosing among drawn cells with the pointer: a press chooses, hovering tells which cell would be. */
export function useCellChoice<Cell extends SheetCell>(
  cells: readonly Cell[],
  grid: CellGrid,
  onChoose: ((cell: Cell) => void) | undefined,
): Cell | null {
  const map = useMap();
  const { view, onPress } = useSheet();
  const [hovered, setHovered] = useState<Cell | null>(null);
  const { scale } = view;
  useEffect(() => {
    if (onChoose === undefined) return undefined;
    return onPress((east, north) => {
      const cell = cellNear(cells, grid, scale, east, north);
      if (cell === undefined) return false;
      onChoose(cell);
      return true;
    });
  }, [onPress, onChoose, cells, grid, scale]);
  useEffect(() => {
    const move = (event: { latlng: { lat: number; lng: number } }) =>
      setHovered(cellNear(cells, grid, scale, event.latlng.lng, event.latlng.lat) ?? null);
    const leave = () => setHovered(null);
    map.on("mousemove", move);
    map.on("mouseout", leave);
    return () => {
      map.off("mousemove", move);
      map.off("mouseout", leave);
    };
  }, [map, cells, grid, scale]);
  return hovered;
}
