import { baseMapOrigins } from "#shared/api/base-map.ts";
import { installationRow } from "../db/installation.ts";
import type { Reader } from "../db/open.ts";

/** Where pictures of the base map may come from, for the Content-Security-Policy of this moment. */
export function baseMapSources(reader: Reader): string {
  const { baseMapUrl } = installationRow(reader);
  return baseMapUrl === null ? "" : (baseMapOrigins(baseMapUrl) ?? []).join(" ");
}
