import type { LngLat } from "#shared/units/metric.ts";

/** A place in degrees with six decimals, about a tenth of a metre: "51.560321° N, 2.010144° E". */
export function placeText({ lng, lat }: LngLat): string {
  const part = (value: number, positive: string, negative: string) =>
    `${Math.abs(value).toFixed(6)}°\u00a0${value < 0 ? negative : positive}`;
  return `${part(lat, "N", "S")}, ${part(lng, "E", "W")}`;
}
