import { useCallback, useMemo } from "react";
import { AreaClip } from "./AreaClip.tsx";
import { CellCallout } from "./CellCallout.tsx";
import { CellKeys } from "./CellKeys.tsx";
import { ChosenCell } from "./ChosenCell.tsx";
import { badgePlace, BADGE, isNear, pathOfCells, pathOfDots, type SheetCell } from "./cell-path.ts";
import { useSheet } from "./sheet-context.ts";
import { cellBox, type CellGrid, type PlanePolygons } from "./sheet-geometry.ts";
import { SheetLayer } from "./SheetLayer.tsx";
import { useCellChoice } from "./use-cell-choice.ts";

/** A drawn cell: one however often it was picked. */
export interface SheetPick extends SheetCell {
  readonly key: string;
  readonly label: string;
  /** The first of its places in the draw. */
  readonly order: number;
  /** How often it was picked. */
  readonly times: number;
  readonly reserve: boolean;
}

interface PicksLayerProps {
  readonly picks: readonly SheetPick[];
  readonly spec: CellGrid;
  /** The area, where the tint of a drawn cell stops at the boundary. */
  readonly clip?: PlanePolygons | undefined;
  readonly chosen?: string | null;
  readonly onChoose?: ((key: string) => void) | undefined;
}

const FIGURES_FROM = 16;
const OUTLINES_FROM = 3;

function nameOf(pick: SheetPick): string {
  const often = pick.times > 1 ? `, picked ${pick.times} times` : "";
  return pick.reserve ? `Cell ${pick.label}, reserve ${pick.order}` : `Cell ${pick.label}, pick ${pick.order}${often}`;
}

/** Drawn cells in pink with their order, reserves dashed, repeats with a badge. */
export function PicksLayer({ picks, spec, clip, chosen = null, onChoose }: PicksLayerProps) {
  const { view, id } = useSheet();
  const drawn = useMemo(() => picks.filter((pick) => !pick.reserve), [picks]);
  const reserves = useMemo(() => picks.filter((pick) => pick.reserve), [picks]);
  const choose = useCallback((pick: SheetPick) => onChoose?.(pick.key), [onChoose]);
  const hovered = useCellChoice(picks, spec, onChoose === undefined ? undefined : choose);
  const side = Math.min(spec.widthMm, spec.heightMm) * 0.001 * view.scale;
  const named = useMemo(
    () => picks.map((pick) => ({ key: pick.key, column: pick.column, row: pick.row, name: nameOf(pick) })),
    [picks],
  );
  const told = side < FIGURES_FROM ? hovered : null;
  return (
    <>
      <SheetLayer slot="drawn">
        {clip !== undefined && (
          <defs>
            <AreaClip id={`${id}-picks`} polygons={clip} at={view} />
          </defs>
        )}
        {side < OUTLINES_FROM ? (
          <path d={pathOfDots(drawn, spec, view)} fill="var(--map-drawn)" />
        ) : (
          <>
            <path
              d={pathOfCells(reserves, spec, view)}
              fill="none"
              stroke="var(--map-reserve)"
              strokeWidth="1.25"
              strokeDasharray="3 2"
            />
            <path
              d={pathOfCells(drawn, spec, view)}
              fill="var(--color-flag-tint)"
              clipPath={clip === undefined ? undefined : `url(#${id}-picks)`}
            />
            <path
              d={pathOfCells(drawn, spec, view)}
              fill="none"
              stroke="var(--map-drawn)"
              strokeWidth={side < 8 ? 1.25 : 1.75}
            />
          </>
        )}
      </SheetLayer>
      <SheetLayer slot="figures">
        {side >= FIGURES_FROM && <Orders picks={drawn} spec={spec} />}
        {side >= 6 && <Badges picks={picks} spec={spec} />}
      </SheetLayer>
      <ChosenCell cell={picks.find((pick) => pick.key === chosen)} grid={spec} />
      {onChoose !== undefined && <CellKeys cells={named} grid={spec} chosen={chosen} onChoose={onChoose} />}
      {told !== null && (
        <CellCallout
          spec={spec}
          column={told.column}
          row={told.row}
          title={told.label}
          note={told.reserve ? `reserve ${told.order}` : `pick ${told.order}`}
          text={told.times > 1 ? `picked ${told.times} times` : undefined}
          quiet
        />
      )}
    </>
  );
}

function Orders({ picks, spec }: { readonly picks: readonly SheetPick[]; readonly spec: CellGrid }) {
  const { view } = useSheet();
  return (
    <g className="q-pick-orders">
      {picks
        .filter((pick) => isNear(pick, spec, view.near))
        .map((pick) => {
          const box = cellBox(spec, pick.column, pick.row, view);
          return (
            <text key={pick.key} x={box.x + box.width / 2} y={box.y + box.height / 2 + 4.2}>
              {pick.order}
            </text>
          );
        })}
    </g>
  );
}

function Badges({ picks, spec }: { readonly picks: readonly SheetPick[]; readonly spec: CellGrid }) {
  const { view } = useSheet();
  const places = useMemo(() => new Set(picks.map((pick) => `${pick.column},${pick.row}`)), [picks]);
  return (
    <>
      {picks
        .filter((pick) => pick.times > 1 && !pick.reserve && isNear(pick, spec, view.near))
        .map((pick) => {
          const box = cellBox(spec, pick.column, pick.row, view);
          const place = badgePlace(pick, box.width, box.height, (column, row) => places.has(`${column},${row}`));
          return (
            <g
              key={pick.key}
              transform={`translate(${box.x + box.width / 2 + place.x} ${box.y + box.height / 2 + place.y})`}
            >
              <rect
                x={-BADGE.width / 2}
                y={-BADGE.height / 2}
                width={BADGE.width}
                height={BADGE.height}
                rx={BADGE.height / 2}
                fill="var(--map-drawn)"
                stroke="var(--color-paper)"
                strokeWidth="1.5"
              />
              <text y="4.2" textAnchor="middle" fontSize="12" fontWeight="700" fill="var(--color-paper)">
                ×{pick.times}
              </text>
            </g>
          );
        })}
    </>
  );
}
