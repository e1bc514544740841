import * as api from "#shared/api/area.ts";
import type { Mount } from "../http/mount.ts";
import { presentArea, presentPlane } from "../presenters/area.ts";
import { importArea } from "../services/import-area.ts";
import { makePlane } from "../services/make-plane.ts";
import { listAreas, readAreaFile, readPlane } from "../services/read-areas.ts";

export function areaRoutes(mount: Mount): void {
  mount.survey(api.listAreas, (ctx) => {
    const { areas, names } = listAreas(ctx);
    return { areas: areas.map((area) => presentArea(area, names)) };
  });

  mount.survey(api.importArea, async (ctx, { file, body, signal }) => {
    const area = await importArea(ctx, file, body, signal);
    return presentArea(area, listAreas(ctx).names);
  });

  mount.survey(api.readAreaFile, (ctx, { params }) => {
    const { name, bytes } = readAreaFile(ctx, params.areaId);
    return { type: "application/octet-stream", fileName: name, body: bytes };
  });

  mount.survey(api.makePlane, async (ctx, { params, body, signal }) =>
    presentPlane(await makePlane(ctx, params.areaId, body.epsg, signal)),
  );

  mount.survey(api.readPlane, (ctx, { params }) => presentPlane(readPlane(ctx, params.areaId, Number(params.epsg))));

  mount.signedIn(api.searchCrs, async (ctx, { query, signal }) => {
    const task = { text: query.text, projectedOnly: query.projected === "yes" };
    return { systems: await ctx.jobs.run("search-crs", task, signal) };
  });
}
