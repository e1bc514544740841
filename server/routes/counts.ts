import * as api from "#shared/api/counts.ts";
import type { Mount } from "../http/mount.ts";
import { presentEntries, presentImport } from "../presenters/counts.ts";
import { presentVisit } from "../presenters/visit.ts";
import { amendCount } from "../services/amend-count.ts";
import { enterCounts } from "../services/enter-counts.ts";
import { importCounts } from "../services/import-counts.ts";
import { listEntries } from "../services/list-entries.ts";
import { viewVisit, viewVisits } from "../services/read-visits.ts";

export function countRoutes(mount: Mount): void {
  mount.survey(api.enterCounts, (ctx, { body }) => {
    enterCounts(ctx, body.entries);
    const visitIds = body.entries.map((entry) => entry.visitId);
    return { visits: viewVisits(ctx, visitIds).map(presentVisit) };
  });

  mount.survey(api.amendCount, (ctx, { params, body }) => {
    amendCount(ctx, params.visitId, body);
    return presentVisit(viewVisit(ctx, params.visitId));
  });

  mount.survey(api.listEntries, (ctx, { params }) => ({ entries: presentEntries(listEntries(ctx, params.visitId)) }));

  mount.survey(api.importCounts, async (ctx, { body, file, signal }) =>
    presentImport(await importCounts(ctx, file, body, signal)),
  );
}
