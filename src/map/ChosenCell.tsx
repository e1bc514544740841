import type { SheetCell } from "./cell-path.ts";
import { useSheet } from "./sheet-context.ts";
import { cellBox, type CellGrid } from "./sheet-geometry.ts";
import { SheetLayer } from "./SheetLayer.tsx";

/** 2 px of ink with 3.5 px of air around the cell that is chosen, here or in the list. */
export function ChosenCell({ cell, grid }: { readonly cell: SheetCell | undefined; readonly grid: CellGrid }) {
  const { view } = useSheet();
  if (cell === undefined) return null;
  const box = cellBox(grid, cell.column, cell.row, view);
  return (
    <SheetLayer slot="chosen">
      <rect
        x={box.x - 3.5}
        y={box.y - 3.5}
        width={box.width + 7}
        height={box.height + 7}
        fill="none"
        stroke="var(--color-ink)"
        strokeWidth="2"
      />
    </SheetLayer>
  );
}
