import { useSheet } from "./sheet-context.ts";
import { SheetLayer } from "./SheetLayer.tsx";

interface SheetNameProps {
  readonly east: number;
  readonly north: number;
  readonly name: string;
  /** Below the name, in sans: "hole, 1.39 ha". */
  readonly note?: string;
  /** On water the halo has the water's colour. */
  readonly water?: boolean;
}

/** The name of a water or a piece of land on the sheet, in italic serif with a halo of paper. */
export function SheetName({ east, north, name, note, water = false }: SheetNameProps) {
  const { view } = useSheet();
  const x = (east - view.anchorEast) * view.scale;
  const y = (view.anchorNorth - north) * view.scale;
  return (
    <SheetLayer slot="figures">
      <text className={water ? "q-sheet-name q-sheet-name-water" : "q-sheet-name"} x={x} y={y}>
        {name}
      </text>
      {note !== undefined && (
        <text x={x} y={y + 15} textAnchor="middle" fontSize="12" fill="var(--color-ink-2)">
          {note}
        </text>
      )}
    </SheetLayer>
  );
}
