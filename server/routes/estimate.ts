import * as api from "#shared/api/estimate.ts";
import type { Mount } from "../http/mount.ts";
import { presentEstimateContext, presentKeptEstimate } from "../presenters/estimate.ts";
import { exportEstimate } from "../services/export-estimate.ts";
import { keepEstimate, listKeptEstimates } from "../services/keep-estimate.ts";
import { frameMeasures, methodsOf } from "../services/methods-facts.ts";
import { readEstimate } from "../services/read-estimate.ts";

export function estimateRoutes(mount: Mount): void {
  mount.survey(api.readEstimate, (ctx) => {
    const view = readEstimate(ctx);
    return {
      result: view.result,
      resultSha256: view.resultSha256,
      context: presentEstimateContext(view, frameMeasures(ctx, view)),
      methods: methodsOf(ctx, view),
    };
  });

  mount.survey(api.exportEstimate, (ctx, { query }) => {
    const { name, text } = exportEstimate(ctx, query.table ?? "picks");
    return { type: "text/csv", fileName: name, body: text };
  });

  mount.survey(api.keepEstimate, (ctx, { body }) => presentKeptEstimate(keepEstimate(ctx, body.resultSha256)));

  mount.survey(api.listKeptEstimates, (ctx) => ({ estimates: listKeptEstimates(ctx).map(presentKeptEstimate) }));
}
