import { crsFromEpsg, type Crs } from "#shared/projection/crs.ts";
import type { LngLat } from "#shared/units/metric.ts";

/**
 * The UTM zone of a place, 1 to 60, with the customary exceptions: zone 32 is wider in south-west Norway (56° to 64° N),
 * and Svalbard (from 72° N) has zones 31, 33, 35 and 37 only.
 */
export function utmZone({ lng, lat }: LngLat): number {
  if (lat >= 56 && lat < 64 && lng >= 3 && lng < 12) return 32;
  if (lat >= 72 && lat <= 84 && lng >= 0 && lng < 42) return lng < 9 ? 31 : lng < 21 ? 33 : lng < 33 ? 35 : 37;
  return Math.min(60, Math.max(1, Math.floor((lng + 180) / 6) + 1));
}

/** WGS 84 / UTM of a place: EPSG:326zz in the north (equator included), EPSG:327zz in the south. */
export function utmFor(place: LngLat): Crs {
  return crsFromEpsg((place.lat < 0 ? 32_700 : 32_600) + utmZone(place));
}
