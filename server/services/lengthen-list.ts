import { lengthenedReserves } from "#shared/draw/draw.ts";
import { entriesSha256 } from "#shared/draw/entries-hash.ts";
import { entriesInUse } from "#shared/field/in-use.ts";
import type { Context } from "../context.ts";
import { insertEntries } from "../db/draws.ts";
import { findFrame } from "../db/frames.ts";
import type { Tx } from "../db/open.ts";
import { type PlacedEntry, placeEntries } from "../jobs/place-entries.ts";
import { actingMember } from "./acting-member.ts";
import type { StratumInUse } from "./draw-in-use.ts";
import { declaredText, neededDeclaration, neededDraw } from "./read-draws.ts";
import { recordEvent } from "./record-event.ts";

/**
 * Where an act asks for more entries than a list has, lengthens the list by the same stream (rule R6), by as many as are
 * asked for and no more. Without replacement a list ends with the frame's last cell; then nothing is added.
 * @param list the list with the act that asks already among its acts
 */
export function lengthenList(tx: Tx, ctx: Context, drawId: string, list: StratumInUse, at: string): void {
  if (list.use.unfilled === 0) return;
  const entries = longEnough(tx, drawId, list);
  const before = list.entries.length;
  if (entries.length <= before) return;
  insertEntries(
    tx,
    entries.slice(before).map((entry) => ({ ...entry, drawId })),
  );
  recordEvent(tx, ctx, {
    surveyId: ctx.surveyId,
    at,
    memberId: actingMember(ctx),
    kind: "list-lengthened",
    payload: {
      version: 1,
      drawId,
      stratum: list.stratum,
      from: before,
      to: entries.length,
      entriesSha256: entriesSha256(entries),
    },
  });
}

/** The list drawn again, until it fills every opening of its acts or the frame has no cell left. */
function longEnough(tx: Tx, drawId: string, { stratum, picks, entries, acts, use }: StratumInUse): PlacedEntry[] {
  let longer: PlacedEntry[] = [...entries];
  for (let { unfilled } = use; unfilled > 0; { unfilled } = entriesInUse(longer, picks, acts)) {
    const drawn = drawAgain(tx, drawId, longer.length - picks + unfilled).filter((entry) => entry.stratum === stratum);
    if (drawn.length === longer.length) break;
    longer = drawn;
  }
  return longer;
}

function drawAgain(tx: Tx, drawId: string, wanted: number): PlacedEntry[] {
  const state = neededDeclaration(tx, neededDraw(tx, drawId).draw.declarationId);
  const { design, generator, frameSha256 } = declaredText(state);
  const frame = findFrame(tx, state.declaration.frameVersionId);
  if (state.seed === null || !frame?.cells) throw new Error(`draw ${drawId} has no seed or no cells`);
  return placeEntries({
    frame: { sha256: frameSha256, units: state.units },
    cells: new Uint8Array(frame.cells),
    design,
    seed: state.seed.text,
    generator,
    reserves: lengthenedReserves(design, state.units, wanted),
  });
}
