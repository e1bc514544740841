import type * as z from "zod/mini";
import type { Declaration, DrawDetail, DrawEntry, listDraws } from "#shared/api/draw.ts";

export type DrawList = z.input<typeof listDraws.answer.schema>;

export function declaration(part: Partial<Declaration> = {}): Declaration {
  return {
    id: "d1",
    frameId: "f1",
    frameNumber: 1,
    frameSha256: "56".repeat(32),
    units: 25,
    design: { kind: "srs-wr", n: 4 },
    generator: "sha256-counter",
    reserves: 2,
    limits: "log-normal",
    level: "0.95",
    seedSource: "typed",
    note: "",
    sha256: "78".repeat(32),
    declaredAt: "2031-06-02T22:10:00Z",
    declaredBy: "Ines Marrow",
    state: "open",
    seed: null,
    abandoned: null,
    drawId: null,
    ...part,
  };
}

export function entry(position: number, part: Partial<DrawEntry> = {}): DrawEntry {
  return {
    stratum: "",
    position,
    unit: position,
    column: position - 1,
    row: 0,
    label: `A${position}`,
    repeatOf: null,
    reserve: false,
    state: "in-use",
    openedFor: null,
    visitId: `v${position}`,
    count: "not-visited",
    ...part,
  };
}

/** A drawn declaration and its draw of four picks and two reserves. Pick 3 is the cell of pick 1 once more. */
export function liveDraw(part: Partial<DrawDetail> = {}): DrawDetail {
  return {
    id: "w1",
    number: 1,
    declarationId: "d1",
    frameId: "f1",
    state: "live",
    drawnAt: "2031-06-03T08:15:00Z",
    drawnBy: "Ines Marrow",
    picks: 4,
    cellsToVisit: 3,
    reserves: 2,
    withdrawn: null,
    declaration: declaration({
      state: "drawn",
      drawId: "w1",
      seed: { text: "0039 1522", at: "2031-06-03T08:15:00Z", by: "Ines Marrow" },
    }),
    entries: [
      entry(1),
      entry(2),
      entry(3, { unit: 1, label: "A1", repeatOf: 1 }),
      entry(4, { state: "closed", count: "unsafe" }),
      entry(5, { reserve: true, openedFor: 4 }),
      entry(6, { reserve: true, state: "reserve", unit: 2, label: "A2", repeatOf: 2, visitId: null }),
    ],
    ...part,
  };
}

/** As the list of draws tells a draw. */
export function summaryOf({ declaration: _, entries: __, ...summary }: DrawDetail): DrawList["draws"][number] {
  return summary;
}

/** Draw 1, withdrawn, with its declaration. */
export function withdrawnDraw(): DrawDetail {
  return liveDraw({
    state: "withdrawn",
    withdrawn: { at: "2031-06-04T07:00:00Z", by: "Ines Marrow", reason: "wrong season" },
  });
}

export function drawList(part: Partial<DrawList> = {}): DrawList {
  return { declarations: [], draws: [], liveDrawId: null, reasonNeeded: null, ...part };
}
