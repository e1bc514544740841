import { builtInSystem } from "#shared/projection/built-in.ts";
import { crsFromEpsg, type Crs } from "#shared/projection/crs.ts";
import { areaScaleAt, distortionInWords } from "#shared/projection/distortion.ts";
import { utmFor, utmZone } from "#shared/projection/utm.ts";
import type { LngLat } from "#shared/units/metric.ts";

/** West, south, east, north in WGS 84 degrees. */
export type Bounds = readonly [number, number, number, number];

export interface SuggestedCrs {
  epsg: number;
  name: string;
  note: string;
}

/** Equal-area systems that are worth offering where a UTM zone is too narrow. */
const EQUAL_AREA = [3035, 5070, 3577];
/** Beyond this a zone's areas differ by more than about a tenth of a per cent over the place. */
const WIDE_DEGREES = 3;

/**
 * Systems for a frame, best first: the UTM zone of the middle (ETRS89 beside WGS 84 in Europe), and for a wide area the
 * equal-area system of its continent before it. Each with how much its areas are out, and whether the area spans zones.
 */
export function suggestFrameCrs(bounds: Bounds): SuggestedCrs[] {
  const [west, south, east, north] = bounds;
  const middle = { lng: (west + east) / 2, lat: (south + north) / 2 };
  const zones = zonesSpanned(bounds);
  const spans = zones.length > 1 ? `; the area spans the zones ${zones[0] ?? ""} to ${zones.at(-1) ?? ""}` : "";
  const utm = [utmFor(middle), etrsUtm(middle)].filter((crs) => crs !== null);
  const local = utm.map((crs) => describe(crs, middle, bounds, spans));
  const equalArea = EQUAL_AREA.filter((code) => within(bounds, builtInSystem(code)?.bounds)).map((code) =>
    describe(crsFromEpsg(code), middle, bounds, "; equal-area"),
  );
  const wide = east - west > WIDE_DEGREES || north - south > 2 * WIDE_DEGREES;
  return wide ? [...equalArea, ...local] : local;
}

function etrsUtm(middle: LngLat): Crs | null {
  const entry = builtInSystem(25_800 + utmZone(middle));
  const inEurope = middle.lat >= 34 && middle.lat <= 72 && middle.lng >= -12 && middle.lng <= 32;
  return entry === undefined || !inEurope ? null : crsFromEpsg(entry.code);
}

/** Zones at the western and the eastern edge and between, at the latitude of the middle. */
function zonesSpanned([west, south, east, north]: Bounds): number[] {
  const lat = (south + north) / 2;
  const [first, last] = [utmZone({ lng: west, lat }), utmZone({ lng: Math.max(west, east - 1e-9), lat })];
  return Array.from({ length: last - first + 1 }, (_, i) => first + i);
}

function describe(crs: Crs, middle: LngLat, [west, south, east, north]: Bounds, addition: string): SuggestedCrs {
  const corners = [west, east].flatMap((lng) => [south, north].map((lat) => areaScaleAt(crs, { lng, lat })));
  const scales = [areaScaleAt(crs, middle), ...corners];
  const worst = scales.reduce((a, b) => (Math.abs(b - 1) > Math.abs(a - 1) ? b : a));
  const atMost = Math.max(...scales) - Math.min(...scales) > 1e-5 ? "at most " : "";
  return {
    epsg: crs.epsg ?? 0,
    name: crs.name,
    note: `${distortionInWords(worst).replace("come out ", `come out ${atMost}`)} here${addition}`,
  };
}

const within = ([west, south, east, north]: Bounds, outer: Bounds | undefined): boolean =>
  outer !== undefined && west >= outer[0] && south >= outer[1] && east <= outer[2] && north <= outer[3];
