import { useSheet } from "./sheet-context.ts";
import { cellBox, type CellGrid } from "./sheet-geometry.ts";
import { SheetLayer } from "./SheetLayer.tsx";

interface CellCalloutProps {
  readonly spec: CellGrid;
  readonly column: number;
  readonly row: number;
  /** The cell's label. */
  readonly title: string;
  /** At the right of it: "unit 651". */
  readonly note?: string | undefined;
  /** Below: "79.4 % inside". */
  readonly text?: string | undefined;
  /** Told on hover: no green outline around the cell. */
  readonly quiet?: boolean;
}

/** A small label on the sheet with a leader to its cell; below the cell, or above it near the lower edge. */
export function CellCallout({ spec, column, row, title, note, text, quiet = false }: CellCalloutProps) {
  const { view } = useSheet();
  const box = cellBox(spec, column, row, view);
  const colour = quiet ? "var(--color-ink)" : "var(--color-act)";
  const middle = box.x + box.width / 2;
  const height = text === undefined ? 27 : 44;
  const width = Math.max(118, 30 + 7.4 * (title.length + (note?.length ?? 0)), 18 + 6.6 * (text?.length ?? 0));
  const lowerEdge = (view.anchorNorth - (view.near.south + (view.near.north - view.near.south) / 4)) * view.scale;
  const rightEdge = (view.near.east - (view.near.east - view.near.west) / 4 - view.anchorEast) * view.scale;
  const above = box.y + box.height + 26 + height > lowerEdge - 6;
  const top = above ? box.y - 26 - height : box.y + box.height + 26;
  const left = Math.min(middle - 45, rightEdge - width - 8);
  return (
    <SheetLayer slot="chosen">
      {!quiet && (
        <rect x={box.x} y={box.y} width={box.width} height={box.height} fill="none" stroke={colour} strokeWidth="2" />
      )}
      <path d={above ? `M${middle} ${box.y}v-26` : `M${middle} ${box.y + box.height}v26`} stroke={colour} />
      <g transform={`translate(${left} ${top})`} className="q-callout">
        <rect width={width} height={height} fill="var(--color-sheet)" stroke={colour} />
        <text x="9" y="18" fontSize="13" fontWeight="600" fill="var(--color-ink)">
          {title}
        </text>
        {note !== undefined && (
          <text x={width - 9} y="18" fontSize="12" textAnchor="end" fill="var(--color-ink-3)">
            {note}
          </text>
        )}
        {text !== undefined && (
          <text x="9" y="35" fontSize="12" fill="var(--color-ink-2)">
            {text}
          </text>
        )}
      </g>
    </SheetLayer>
  );
}
