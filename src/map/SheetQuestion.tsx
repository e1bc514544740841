import { useSheet } from "./sheet-context.ts";
import { SheetLayer } from "./SheetLayer.tsx";

/** A ring of ochre around a place that a question is about: where a boundary crosses itself. */
export function SheetQuestion({
  east,
  north,
  label,
}: {
  readonly east: number;
  readonly north: number;
  readonly label: string;
}) {
  const { view } = useSheet();
  const x = (east - view.anchorEast) * view.scale;
  const y = (view.anchorNorth - north) * view.scale;
  return (
    <SheetLayer slot="chosen">
      <circle cx={x} cy={y} r="17" fill="none" stroke="var(--color-ochre)" strokeWidth="2.25" />
      <text className="q-sheet-name" x={x} y={y + 34}>
        {label}
      </text>
    </SheetLayer>
  );
}
