import { useEffect, useMemo, useRef } from "react";
import { useMap } from "react-leaflet";
import type { CellRows } from "#shared/frame/cells.ts";
import { CellTiles } from "./CellTiles.ts";
import { useSheet } from "./sheet-context.ts";
import { cellAt, type CellGrid, type PlanePolygons } from "./sheet-geometry.ts";
import { useThemeColours } from "./use-theme-colours.ts";

interface FrameCellsLayerProps {
  readonly cells: CellRows;
  readonly spec: CellGrid;
  /** The area, where cells are counted only inside the boundary: tint and lines stop there. */
  readonly clip?: PlanePolygons | undefined;
  /** A press on the sheet, with the cell that holds the place, whether it is in the frame or not. */
  readonly onChoose?: ((column: number, row: number) => void) | undefined;
}

const COLOURS = { line: "--map-cell-line", edge: "--map-edge-cell" } as const;

/** The cells of a frame, from ten to ten million. */
export function FrameCellsLayer({ cells, spec, clip, onChoose }: FrameCellsLayerProps) {
  const map = useMap();
  const { onPress } = useSheet();
  const colours = useThemeColours(COLOURS);
  const rings = useMemo(() => clip?.flat() ?? null, [clip]);
  const tiles = useRef<CellTiles | null>(null);
  const { widthMm, heightMm, originEastMm, originNorthMm } = spec;
  const content = useMemo(
    () => ({ cells, grid: { widthMm, heightMm, originEastMm, originNorthMm }, clip: rings, colours }),
    [cells, widthMm, heightMm, originEastMm, originNorthMm, rings, colours],
  );
  const latest = useRef(content);
  useEffect(() => {
    latest.current = content;
    tiles.current?.show(content);
  }, [content]);
  useEffect(() => {
    const layer = new CellTiles(latest.current);
    tiles.current = layer;
    layer.addTo(map);
    return () => {
      tiles.current = null;
      layer.remove();
    };
  }, [map]);
  useEffect(() => {
    if (onChoose === undefined) return undefined;
    return onPress((east, north) => {
      const { column, row } = cellAt({ widthMm, heightMm, originEastMm, originNorthMm }, east, north);
      onChoose(column, row);
      return true;
    });
  }, [onPress, onChoose, widthMm, heightMm, originEastMm, originNorthMm]);
  return null;
}
