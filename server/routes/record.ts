import * as api from "#shared/api/record.ts";
import type { Mount } from "../http/mount.ts";
import { presentEvents } from "../presenters/record.ts";
import { jsonSchemaOf } from "../services/json-schemas.ts";
import { listEvents } from "../services/list-events.ts";
import { openApi } from "../services/openapi.ts";
import { readRecordFile } from "../services/read-record-file.ts";
import { ready } from "../services/ready.ts";

export function recordRoutes(mount: Mount): void {
  mount.survey(api.listEvents, (ctx, { query }) =>
    presentEvents(listEvents(ctx, query.before === undefined ? null : Number(query.before))),
  );

  mount.survey(api.readRecordFile, (ctx) => {
    const { name, text } = readRecordFile(ctx);
    return { type: "application/json", fileName: name, body: text };
  });

  mount.open(api.readSchema, (_ctx, { params }) => ({
    type: "application/schema+json",
    body: jsonSchemaOf(params.name),
  }));

  mount.open(api.readOpenApi, (ctx) => ({ type: "application/json", body: openApi(ctx.version) }));

  mount.open(api.health, (ctx) => ({ status: "up" as const, version: ctx.version }));

  mount.open(api.ready, (ctx) => {
    ready(ctx);
    return { status: "ready" as const };
  });
}
