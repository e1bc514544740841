import { WHOLE_CELL } from "#shared/units/metric.ts";
import type { CellAddress, CountIn, Membership } from "./cell-spec.ts";
import type { FrameSummary, MeasuredCells } from "./cells.ts";
import { inListOrder, isMember, pieceOf } from "./member.ts";

/** Listed cells: how many, and the sum of their shares in billionths. */
interface Listed {
  wholeCells: number;
  edgeCells: number;
  edgeShares: bigint;
}

/** mm² in half billionths of a square millimetre → m². */
const HALF_BILLIONTHS_PER_M2 = 2e15;

/**
 * How many cells a choice would list and what they would cover; nothing is selected for it, so it holds for any number.
 *
 * Sums are exact in billionths of a cell. What no listed cell holds is the exact area less the listed shares; where it is no more
 * than the rounding of shares to billionths can explain (half a billionth of a cell for each edge cell), it is 0.
 */
export function summarise(
  measured: MeasuredCells,
  membership: Membership,
  countIn: CountIn,
  leftOut: readonly CellAddress[] = [],
): FrameSummary {
  const { widthMm, heightMm } = measured.spec;
  const listed = listedCells(measured, membership);
  for (const address of inListOrder(leftOut)) {
    const piece = pieceOf(measured, address);
    if (piece < 0 || !isMember(measured, piece, membership)) continue;
    const share = measured.share[piece] ?? 0;
    if (share === WHOLE_CELL) listed.wholeCells -= 1;
    else {
      listed.edgeCells -= 1;
      listed.edgeShares -= BigInt(share);
    }
  }
  const cells = listed.wholeCells + listed.edgeCells;
  const shareSumBillionths = BigInt(listed.wholeCells) * BigInt(WHOLE_CELL) + listed.edgeShares;
  const cellMm2 = BigInt(widthMm) * BigInt(heightMm);
  const inside = 2n * shareSumBillionths * cellMm2;
  const whole = 2n * BigInt(cells) * BigInt(WHOLE_CELL) * cellMm2;
  const area = measured.twiceAreaMm2 * BigInt(WHOLE_CELL);
  const uncovered = area - inside;
  const explained = BigInt(measured.share.length) * cellMm2;
  return {
    cells,
    wholeCells: listed.wholeCells,
    edgeCells: listed.edgeCells,
    frameAreaM2: toM2(countIn === "inside" ? inside : whole),
    areaM2: toM2(area),
    uncoveredM2: uncovered <= explained ? 0 : toM2(uncovered),
    outsideM2: toM2(whole - inside),
    shareSumBillionths,
  };
}

const toM2 = (halfBillionths: bigint): number => Number(halfBillionths) / HALF_BILLIONTHS_PER_M2;

function listedCells(measured: MeasuredCells, membership: Membership): Listed {
  const listed: Listed = { wholeCells: 0, edgeCells: 0, edgeShares: 0n };
  let shares = 0;
  for (let piece = 0; piece < measured.share.length; piece += 1) {
    if (!isMember(measured, piece, membership)) continue;
    const share = measured.share[piece] ?? 0;
    if (share === WHOLE_CELL) listed.wholeCells += (measured.last[piece] ?? 0) - (measured.first[piece] ?? 0) + 1;
    else {
      listed.edgeCells += 1;
      shares += share;
      if (shares >= Number.MAX_SAFE_INTEGER - WHOLE_CELL) {
        listed.edgeShares += BigInt(shares);
        shares = 0;
      }
    }
  }
  listed.edgeShares += BigInt(shares);
  return listed;
}
