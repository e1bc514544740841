import * as api from "#shared/api/draw.ts";
import type { Mount } from "../http/mount.ts";
import { presentDeclaration, presentDraw, presentDraws } from "../presenters/draw.ts";
import { abandonDeclaration } from "../services/abandon-declaration.ts";
import { declareDraw } from "../services/declare-draw.ts";
import { makeDraw } from "../services/make-draw.ts";
import { listDraws, readDeclaration, readDraw, readRecipe } from "../services/read-draws.ts";
import { withdrawDraw } from "../services/withdraw-draw.ts";

export function drawRoutes(mount: Mount): void {
  mount.survey(api.listDraws, (ctx) => presentDraws(listDraws(ctx)));

  mount.survey(api.declareDraw, (ctx, { body }) => presentDeclaration(readDeclaration(ctx, declareDraw(ctx, body))));

  mount.survey(api.makeDraw, async (ctx, { params, body, signal }) =>
    presentDraw(readDraw(ctx, await makeDraw(ctx, params.declarationId, body.seed, signal))),
  );

  mount.survey(api.abandonDeclaration, (ctx, { params, body }) => {
    abandonDeclaration(ctx, params.declarationId, body.reason);
    return presentDeclaration(readDeclaration(ctx, params.declarationId));
  });

  mount.survey(api.readDraw, (ctx, { params }) => presentDraw(readDraw(ctx, params.drawId)));

  mount.survey(api.withdrawDraw, (ctx, { params, body }) => {
    withdrawDraw(ctx, params.drawId, body.reason);
    return presentDraw(readDraw(ctx, params.drawId));
  });

  mount.survey(api.readRecipe, (ctx, { params }) => readRecipe(ctx, params.drawId));
}
