import { type EstimateContext, estimateResult, type KeptEstimate } from "#shared/api/estimate.ts";
import { summaryOf } from "../db/frames.ts";
import type { KeptEstimateView } from "../services/keep-estimate.ts";
import type { EstimateView } from "../services/read-estimate.ts";
import { presentDeclaration } from "./draw.ts";

interface Measures {
  readonly crsName: string;
  readonly cellWidthM: number;
  readonly cellHeightM: number;
}

export function presentEstimateContext(view: EstimateView, measures: Measures): EstimateContext {
  const { season, target, frame, draw, newest } = view;
  if (frame.frameSha256 === null || frame.sealedAt === null) throw new Error(`frame ${frame.id} is not sealed`);
  const { singular, plural, countingRule, wholeNumbers } = target;
  const { crsName, cellWidthM, cellHeightM } = measures;
  return {
    season: { id: season.id, name: season.name, position: season.position },
    target: { id: target.id, singular, plural, countingRule, wholeNumbers },
    frame: {
      id: frame.id,
      number: frame.number,
      sha256: frame.frameSha256,
      sealedAt: frame.sealedAt,
      ...{ crsName, cellWidthM, cellHeightM },
      summary: summaryOf(frame),
    },
    draw: { id: draw.draw.id, number: draw.draw.number, drawnAt: draw.draw.drawnAt },
    declaration: presentDeclaration(view.declaration),
    chosenAfterCounts: [...view.chosenAfterCounts],
    firstCountAt: view.firstCountAt,
    newest: { sequence: newest.sequence, sha256: newest.sha256 },
  };
}

export function presentKeptEstimate({ row, resultSha256, names }: KeptEstimateView): KeptEstimate {
  return {
    id: row.id,
    seasonId: row.seasonId,
    targetId: row.targetId,
    keptAt: row.keptAt,
    keptBy: names.get(row.keptBy) ?? "somebody",
    resultSha256,
    result: estimateResult.parse(row.result),
  };
}
