import type { CellCount } from "#shared/counts/count.ts";
import { saySame } from "#shared/counts/count.ts";
import { readCountText } from "#shared/counts/read-count-text.ts";
import { readStateText } from "#shared/counts/read-state-text.ts";
import type { DrawnPick } from "#shared/estimate/from-counts.ts";
import { type CsvTable, readCsv } from "#shared/exchange/csv.ts";
import { Problem } from "#shared/problem.ts";

export interface PicksTable {
  readonly picks: readonly DrawnPick[];
  readonly counts: ReadonlyMap<number, CellCount>;
  /** The table says which cell each pick is. */
  readonly unitsKnown: boolean;
  readonly notes: readonly string[];
}

/**
 * A table of picks: `pick,unit,count[,state]`. `unit` tells repeats apart, by whatever text names a cell; without it each
 * pick counts as a cell of its own. An empty count is uncounted, never zero.
 * @throws Problem `table-unreadable` or `count-invalid` that names the line.
 */
export function readPicks(bytes: Uint8Array): PicksTable {
  const { value: table, notes } = readCsv(bytes);
  const columns = {
    pick: columnOf(table, "pick"),
    unit: columnOf(table, "unit"),
    count: columnOf(table, "count"),
    state: columnOf(table, "state"),
  };
  if (columns.count === -1) {
    throw new Problem("table-unreadable", `There is no column "count" among ${table.header.join(", ")}. Name it so.`);
  }
  const numbers = new Map<string, number>();
  const counts = new Map<number, CellCount>();
  const picks: DrawnPick[] = [];
  const orders = new Set<number>();
  table.rows.forEach((row, place) => {
    const line = `Line ${table.lines[place] ?? place + 2}`;
    const label = columns.unit === -1 ? `#${place + 1}` : (row[columns.unit] ?? "").trim();
    if (label === "") throw new Problem("table-unreadable", `${line} names no unit. Fill in the column "unit".`);
    const unit = numbers.get(label) ?? numbers.size + 1;
    const count = readCount(line, row[columns.count] ?? "", columns.state === -1 ? "" : (row[columns.state] ?? ""));
    const known = counts.get(unit);
    if (known !== undefined && !saySame(known, count)) {
      throw new Problem(
        "count-invalid",
        `${line}: the cell ${label} has another count in an earlier line. A repeat has its cell's count in every line.`,
      );
    }
    numbers.set(label, unit);
    counts.set(unit, count);
    const order = orderOf(line, columns.pick === -1 ? "" : (row[columns.pick] ?? ""), place);
    if (orders.has(order)) {
      throw new Problem("table-unreadable", `${line}: pick ${order} stands in an earlier line too. Number picks once.`);
    }
    orders.add(order);
    picks.push({ order, unit, label });
  });
  return { picks, counts, unitsKnown: columns.unit !== -1, notes };
}

function columnOf(table: CsvTable, name: string): number {
  return table.header.findIndex((title) => title.trim().toLowerCase() === name);
}

function orderOf(line: string, text: string, place: number): number {
  const trimmed = text.trim();
  if (trimmed === "") return place + 1;
  if (/^[1-9]\d{0,8}$/.test(trimmed)) return Number(trimmed);
  throw new Problem("table-unreadable", `${line}: the pick is "${trimmed}". Picks are numbered 1, 2, 3 and so on.`);
}

/** What a line says of its cell. A count and a state that contradict each other are refused. */
function readCount(line: string, countText: string, stateText: string): CellCount {
  const state = stateText.trim() === "" ? null : readStateText(stateText);
  if (state === "unknown") {
    throw new Problem(
      "count-invalid",
      `${line}: "${stateText.trim()}" is no state. Use counted, refused, unsafe or lost.`,
    );
  }
  const reading = readCountText(countText);
  switch (reading.kind) {
    case "value":
      if (state === null || state === "counted") return { state: "counted", value: reading.value };
      if (state === "not-in-population" && reading.value === 0) return { state };
      throw new Problem("count-invalid", `${line} has the count ${reading.value} and the state "${state}". Keep one.`);
    case "state":
      return { state: reading.state };
    case "empty":
      if (state === "counted") throw new Problem("count-invalid", `${line} is counted, but has no count. Fill it in.`);
      return { state: state ?? "not-visited" };
    case "question":
    case "refused":
      throw new Problem("count-invalid", `${line}: ${reading.message}`);
  }
}
