import type { DrawEntry } from "#shared/api/draw.ts";
import type { SheetPick } from "../../map/PicksLayer.tsx";

/** One mark a cell, whatever the number of its entries; a reserve that was not opened is dashed. */
export function sheetPicks(entries: readonly DrawEntry[]): SheetPick[] {
  const cells = new Map<number, SheetPick>();
  for (const entry of entries) {
    const reserve = entry.state === "reserve" || entry.state === "passed-over";
    const known = cells.get(entry.unit);
    if (known !== undefined && (reserve || !known.reserve)) {
      if (!reserve) cells.set(entry.unit, { ...known, times: known.times + 1 });
      continue;
    }
    cells.set(entry.unit, {
      key: String(entry.unit),
      column: entry.column,
      row: entry.row,
      label: entry.label,
      order: entry.position,
      times: 1,
      reserve,
    });
  }
  return [...cells.values()];
}
