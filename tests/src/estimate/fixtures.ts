import type { EstimateContext } from "#shared/api/estimate.ts";
import type { Visit } from "#shared/api/field.ts";
import type { EstimateResult } from "#shared/estimate/result.ts";
import { sealed, survey } from "../app/fixtures.ts";

const SEALED = sealed();

/** What the estimate page stands on: draw 2 on the sealed frame of the app's fixtures, seed "0042". */
export function context(part: Partial<EstimateContext> = {}): EstimateContext {
  const [season] = survey().seasons;
  const [target] = survey().targets;
  if (season === undefined || target === undefined || SEALED.sealed === null) throw new RangeError("no fixture");
  return {
    season,
    target,
    frame: {
      id: SEALED.id,
      number: 1,
      sha256: "56".repeat(32),
      sealedAt: "2031-05-02T11:02:00Z",
      crsName: SEALED.crs.name,
      cellWidthM: 20,
      cellHeightM: 20,
      summary: SEALED.sealed.summary,
    },
    draw: { id: "d2", number: 2, drawnAt: "2031-05-03T09:00:00Z" },
    declaration: {
      id: "de2",
      frameId: SEALED.id,
      frameNumber: 1,
      frameSha256: "56".repeat(32),
      units: 50,
      design: { kind: "srs-wr", n: 5 },
      generator: "sha256-counter",
      reserves: 2,
      limits: "log-normal",
      level: "0.95",
      seedSource: "typed",
      note: "",
      sha256: "78".repeat(32),
      declaredAt: "2031-05-03T08:00:00Z",
      declaredBy: "Ines Marrow",
      state: "drawn",
      seed: { text: "0042", at: "2031-05-03T08:30:00Z", by: "Ines Marrow" },
      abandoned: null,
      drawId: "d2",
    },
    chosenAfterCounts: [],
    firstCountAt: "2031-05-05T08:00:00Z",
    newest: { sequence: 41, sha256: "9a".repeat(32) },
    ...part,
  };
}

/** The answer of the server around a result; its hash is any text of 64 characters. */
export function answer(result: EstimateResult, part: Partial<EstimateContext> = {}, hash = "ab") {
  return { result, resultSha256: hash.repeat(32), context: context(part), methods: "## Methods" };
}

const ENTRY = {
  entryId: "0b8f3f8e-2f4e-4c39-9d1c-3a6a1a1f4f10",
  by: "Ines Marrow",
  at: "2031-05-05T08:00:00Z",
  note: "",
  amended: false,
};
export const zero: Visit["count"] = { state: "counted", value: 0, ...ENTRY };
export const unsafe: Visit["count"] = { state: "unsafe", ...ENTRY };

/** A cell to visit, with its places in the draw and what is known of it. */
export function visit(unit: number, label: string, orders: number[], count: Visit["count"]): Visit {
  return {
    id: `v${unit}`,
    unit,
    column: unit,
    row: 0,
    label,
    shareBillionths: 1_000_000_000,
    orders,
    state: "in-use",
    openedFor: null,
    centre: { eastM: 10, northM: 10, lng: 2, lat: 51 },
    assignedTo: null,
    count,
  };
}
