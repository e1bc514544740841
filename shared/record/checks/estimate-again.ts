import { areaSpokenForM2 } from "#shared/estimate/density.ts";
import { estimateOfDraw, type ListOfDraw } from "#shared/estimate/from-draw.ts";
import type { EstimateResult } from "#shared/estimate/result.ts";
import type { Entry } from "#shared/draw/draw.ts";
import type { FrameCells } from "#shared/frame/cells.ts";
import { labelOf, unitAt } from "#shared/frame/list.ts";
import type { ReplayRun } from "./check.ts";
import { type Declared, declaredOf, type StoredDraw } from "./declared.ts";
import type { RebuiltFrame } from "./frame-rebuilt.ts";
import { countsStanding, listsStanding } from "./standing.ts";

export interface EstimateOf {
  readonly seasonId: string;
  readonly targetId: string;
  /** As it stood after this event. */
  readonly until: number;
}

/**
 * The estimate again, from the events alone: the season's draw that was live then, its picks in use, the counts in force,
 * N and the area from the frame made again, level and limits as declared. Null where one of these is not known.
 * @throws Problem `estimate-impossible` where nothing was counted
 */
export function estimateAgain(run: ReplayRun, of: EstimateOf): EstimateResult | null {
  const declared = liveDrawAt(run, of);
  const frame = declared === null ? undefined : run.frames.get(declared.draw.frameId);
  if (declared?.value == null || frame?.cells == null || frame.statement === null) return null;
  const lists = listsStanding(run, declared, of.until);
  if (lists.length === 0) return null;
  const { cells, statement } = frame;
  return estimateOfDraw({
    design: declared.value.design.kind,
    units: cells.units,
    lists: lists.map(({ entries, use }) => ({ entries: entries.slice(0, use.openedTo).map(namedBy(cells)), use })),
    standing: countsStanding(run, { ...of, frameId: declared.draw.frameId }, of.until),
    countIn: statement.countIn,
    areaM2: areaOf(statement, cells),
    level: declared.value.level,
    limits: declared.value.limits,
  });
}

/** The newest draw of the season that was made and not withdrawn at that event. */
export function liveDrawAt(
  run: ReplayRun,
  { seasonId, until }: EstimateOf,
): (Declared & { readonly draw: StoredDraw }) | null {
  const made = new Map(run.events.of("draw-made").map(({ sequence, payload }) => [payload.drawId, sequence]));
  const ended = new Map(run.events.of("draw-withdrawn").map(({ sequence, payload }) => [payload.drawId, sequence]));
  return (
    declaredOf(run.record, run.events)
      .flatMap((one) => (one.draw === null || one.stored.seasonId !== seasonId ? [] : [{ ...one, draw: one.draw }]))
      .findLast(({ draw }) => {
        const sequence = made.get(draw.id);
        const end = ended.get(draw.id);
        return sequence !== undefined && sequence <= until && (end === undefined || end > until);
      }) ?? null
  );
}

function namedBy(cells: FrameCells): (entry: Entry) => ListOfDraw["entries"][number] {
  return ({ position, unit }) => {
    const { column, row } = unitAt(cells, unit);
    return { position, unit, label: labelOf(cells, column, row) };
  };
}

function areaOf(statement: NonNullable<RebuiltFrame["statement"]>, cells: FrameCells): number {
  const { widthMm, heightMm } = statement.cells;
  return areaSpokenForM2({
    countIn: statement.countIn,
    units: cells.units,
    cellAreaMm2: BigInt(widthMm) * BigInt(heightMm),
    shareSumBillionths: sumOfShares(cells),
  });
}

/** Sum of the listed shares, in billionths. */
function sumOfShares({ first, last, share }: FrameCells): bigint {
  let sum = 0n;
  for (const [piece, each] of share.entries()) {
    sum += BigInt(each) * BigInt((last[piece] ?? 0) - (first[piece] ?? 0) + 1);
  }
  return sum;
}
