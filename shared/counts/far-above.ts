/** A count this many times the next largest is worth a look at the sheet. */
const FAR = 10;
const FEWEST_CELLS = 3;

/**
 * The cell whose number is at least ten times the next largest (at least 10, where all others are zero), and that next
 * largest. None where there are fewer than three cells. Such a count is kept; somebody looks at the sheet.
 */
export function findFarAbove<Cell extends { readonly unit: number; readonly value: number }>(
  cells: readonly Cell[],
): { readonly cell: Cell; readonly nextLargest: number } | "none" {
  const byUnit = new Map(cells.map((cell) => [cell.unit, cell]));
  if (byUnit.size < FEWEST_CELLS) return "none";
  const [largest, second] = [...byUnit.values()].sort((a, b) => b.value - a.value);
  if (largest === undefined || second === undefined) return "none";
  const least = second.value === 0 ? FAR : FAR * second.value;
  return largest.value >= least ? { cell: largest, nextLargest: second.value } : "none";
}
