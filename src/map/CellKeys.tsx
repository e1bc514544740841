import { useRef, useState } from "react";
import { useMap } from "react-leaflet";
import type { SheetCell } from "./cell-path.ts";
import { place } from "./planar-map.ts";
import { useSheet } from "./sheet-context.ts";
import { cellBox, type CellGrid } from "./sheet-geometry.ts";
import { SheetLayer } from "./SheetLayer.tsx";

export interface NamedCell extends SheetCell {
  readonly key: string;
  /** Read out when the cell has the focus: "Cell H20, pick 9, picked twice". */
  readonly name: string;
}

interface CellKeysProps {
  /** In the order in which the arrows go through them. */
  readonly cells: readonly NamedCell[];
  readonly grid: CellGrid;
  readonly chosen: string | null;
  readonly onChoose: (key: string) => void;
}

/** One stop of the Tab key for all drawn cells: arrows go from cell to cell in draw order and bring each into sight, Enter chooses. */
export function CellKeys({ cells, grid, chosen, onChoose }: CellKeysProps) {
  const map = useMap();
  const { view } = useSheet();
  const [focused, setFocused] = useState<string | null>(null);
  const group = useRef<SVGGElement>(null);
  const stop = cells.find((cell) => cell.key === (focused ?? chosen)) ?? cells[0];
  if (stop === undefined) return null;
  const box = cellBox(grid, stop.column, stop.row, view);
  const go = (index: number) => {
    const next = cells[Math.min(cells.length - 1, Math.max(0, index))];
    if (next === undefined) return;
    setFocused(next.key);
    map.panInside(
      place(
        (grid.originEastMm + (next.column + 0.5) * grid.widthMm) / 1000,
        (grid.originNorthMm + (next.row + 0.5) * grid.heightMm) / 1000,
      ),
      { padding: [40, 40], animate: false },
    );
  };
  const index = cells.indexOf(stop);
  return (
    <SheetLayer slot="chosen">
      <g
        ref={group}
        className="q-cell-keys"
        tabIndex={0}
        role="button"
        aria-label={`${stop.name}. Arrows: next cell. Enter: choose.`}
        aria-pressed={stop.key === chosen}
        onBlur={() => setFocused(null)}
        onKeyDown={(event) => {
          const goals: Readonly<Record<string, number>> = {
            ArrowRight: index + 1,
            ArrowDown: index + 1,
            ArrowLeft: index - 1,
            ArrowUp: index - 1,
            Home: 0,
            End: cells.length - 1,
          };
          const goal = goals[event.key];
          if (event.key === "Enter" || event.key === " ") onChoose(stop.key);
          else if (goal !== undefined) go(goal);
          else return;
          event.preventDefault();
        }}
      >
        <rect className="q-cell-keys-gap" x={box.x - 3} y={box.y - 3} width={box.width + 6} height={box.height + 6} />
        <rect className="q-cell-keys-ring" x={box.x - 4} y={box.y - 4} width={box.width + 8} height={box.height + 8} />
      </g>
    </SheetLayer>
  );
}
