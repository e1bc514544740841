import { useCallback, useMemo } from "react";
import { AreaClip } from "./AreaClip.tsx";
import { CellCallout } from "./CellCallout.tsx";
import { CellKeys } from "./CellKeys.tsx";
import { ChosenCell } from "./ChosenCell.tsx";
import { isNear, pathOfCells, type SheetCell } from "./cell-path.ts";
import { COUNT_CLASSES, countClass } from "./count-classes.ts";
import { useSheet } from "./sheet-context.ts";
import { cellBox, type CellGrid, type PlanePolygons } from "./sheet-geometry.ts";
import { SheetLayer } from "./SheetLayer.tsx";
import { useCellChoice } from "./use-cell-choice.ts";

/** A cell to visit and what is known of it. A missing count is a state, never a number. */
export type SheetCount = SheetCell & { readonly key: string; readonly label: string } & (
    | { readonly state: "counted"; readonly value: number }
    /** Visited or closed without a count; the word says why: "refused". */
    | { readonly state: "not-counted"; readonly word: string }
    | { readonly state: "not-visited" }
  );

interface CountsLayerProps {
  readonly counts: readonly SheetCount[];
  readonly spec: CellGrid;
  readonly clip?: PlanePolygons | undefined;
  readonly chosen?: string | null;
  readonly onChoose?: ((key: string) => void) | undefined;
}

function saidOf(count: SheetCount): string {
  switch (count.state) {
    case "counted":
      return `count ${count.value}`;
    case "not-counted":
      return count.word;
    case "not-visited":
      return "not visited yet";
  }
}

/** Counts by value: six steps, outline in ink, zero with a ring; not counted in ochre with a diagonal and never on the ramp. */
export function CountsLayer({ counts, spec, clip, chosen = null, onChoose }: CountsLayerProps) {
  const { view, id } = useSheet();
  const byClass = useMemo(
    () =>
      COUNT_CLASSES.map((_, step) =>
        counts.filter((count) => count.state === "counted" && countClass(count.value) === step),
      ),
    [counts],
  );
  const counted = useMemo(() => counts.filter((count) => count.state === "counted"), [counts]);
  const missing = useMemo(() => counts.filter((count) => count.state === "not-counted"), [counts]);
  const waiting = useMemo(() => counts.filter((count) => count.state === "not-visited"), [counts]);
  const choose = useCallback((count: SheetCount) => onChoose?.(count.key), [onChoose]);
  const hovered = useCellChoice(counts, spec, onChoose === undefined ? undefined : choose);
  const named = useMemo(
    () => counts.map((count) => ({ ...count, name: `Cell ${count.label}, ${saidOf(count)}` })),
    [counts],
  );
  const chosenCount = counts.find((count) => count.key === chosen);
  const told = chosenCount ?? hovered;
  const clipPath = clip === undefined ? undefined : `url(#${id}-counts)`;
  return (
    <>
      <SheetLayer slot="fill">
        {clip !== undefined && (
          <defs>
            <AreaClip id={`${id}-counts`} polygons={clip} at={view} />
          </defs>
        )}
        {byClass.map((cells, step) => (
          <path
            key={COUNT_CLASSES[step]?.label}
            d={pathOfCells(cells, spec, view)}
            fill={COUNT_CLASSES[step]?.fill}
            clipPath={clipPath}
          />
        ))}
        <path d={pathOfCells(missing, spec, view)} fill="var(--color-paper)" clipPath={clipPath} />
      </SheetLayer>
      <SheetLayer slot="drawn">
        <path d={pathOfCells(counted, spec, view)} fill="none" stroke="var(--color-ink)" strokeWidth="1" />
        <path d={pathOfCells(waiting, spec, view)} fill="none" stroke="var(--map-drawn)" strokeWidth="1.75" />
        <path
          d={pathOfCells(missing, spec, view) + diagonals(missing, spec, view)}
          fill="none"
          stroke="var(--map-not-counted)"
          strokeWidth="1.75"
        />
      </SheetLayer>
      <SheetLayer slot="figures">
        {(byClass[0] ?? [])
          .filter((count) => isNear(count, spec, view.near))
          .map((count) => {
            const box = cellBox(spec, count.column, count.row, view);
            return (
              <circle
                key={count.key}
                cx={box.x + box.width / 2}
                cy={box.y + box.height / 2}
                r={Math.min(5, Math.max(1.5, box.width / 4.6))}
                fill="none"
                stroke="var(--color-ink)"
                strokeWidth={box.width < 10 ? 1 : 1.4}
              />
            );
          })}
      </SheetLayer>
      <ChosenCell cell={chosenCount} grid={spec} />
      {onChoose !== undefined && <CellKeys cells={named} grid={spec} chosen={chosen} onChoose={onChoose} />}
      {told !== null && (
        <CellCallout spec={spec} column={told.column} row={told.row} title={told.label} text={saidOf(told)} quiet />
      )}
    </>
  );
}

function diagonals(cells: readonly SheetCell[], spec: CellGrid, at: Parameters<typeof cellBox>[3]): string {
  return cells
    .map((cell) => {
      const box = cellBox(spec, cell.column, cell.row, at);
      return `M${box.x.toFixed(2)} ${(box.y + box.height).toFixed(2)}l${box.width.toFixed(2)} ${(-box.height).toFixed(2)}`;
    })
    .join("");
}
