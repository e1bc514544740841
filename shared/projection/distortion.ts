import type { Crs } from "#shared/projection/crs.ts";
import { squareDegree } from "#shared/projection/geodesic.ts";
import { transformer, WGS84 } from "#shared/projection/transformer.ts";
import type { LngLat } from "#shared/units/metric.ts";

const STEP_DEGREES = 1e-4;

/**
 * Plane area for each unit of true area at a place: 1 where areas are true, 0.9992 in the middle of a UTM zone. The determinant
 * of the projection's derivatives (central differences over 10⁻⁴ degrees, good to about 10⁻⁷) over the ellipsoid's area element.
 */
export function areaScaleAt(crs: Crs, { lng, lat }: LngLat): number {
  const { forward } = transformer(WGS84, crs);
  const unit = crs.metresPerUnit ?? 1;
  const [west, east] = [forward([lng - STEP_DEGREES, lat]), forward([lng + STEP_DEGREES, lat])];
  const [south, north] = [forward([lng, lat - STEP_DEGREES]), forward([lng, lat + STEP_DEGREES])];
  const determinant = (east[0] - west[0]) * (north[1] - south[1]) - (east[1] - west[1]) * (north[0] - south[0]);
  return (Math.abs(determinant) * unit * unit) / (4 * STEP_DEGREES * STEP_DEGREES) / squareDegree(lat);
}

/** The distortion in a sentence: scale 0.9993 is "areas come out 0.07 % small". */
export function distortionInWords(scale: number): string {
  const percent = Math.abs(scale - 1) * 100;
  if (percent < 0.0005) return "areas come out true";
  const digits = percent >= 10 ? 0 : percent >= 1 ? 1 : percent >= 0.01 ? 2 : 3;
  return `areas come out ${percent.toFixed(digits)} % ${scale < 1 ? "small" : "large"}`;
}
