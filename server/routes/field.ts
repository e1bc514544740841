import * as api from "#shared/api/field.ts";
import type { Mount } from "../http/mount.ts";
import { presentClosing, presentVisits } from "../presenters/visit.ts";
import { assignVisits } from "../services/assign-visits.ts";
import { closePick } from "../services/close-pick.ts";
import { exportWaypoints } from "../services/export-waypoints.ts";
import { listVisits } from "../services/read-visits.ts";

export function fieldRoutes(mount: Mount): void {
  mount.survey(api.listVisits, (ctx) => presentVisits(listVisits(ctx)));

  mount.survey(api.assignVisits, (ctx, { body }) => ({ assigned: assignVisits(ctx, body) }));

  mount.survey(api.closePick, (ctx, { params, body }) => presentClosing(closePick(ctx, params.visitId, body)));

  mount.survey(api.exportWaypoints, async (ctx, { body, signal }) => {
    const { name, format, text } = await exportWaypoints(ctx, body, signal);
    return { type: format === "gpx" ? "application/gpx+xml" : "text/csv", fileName: name, body: text };
  });
}
