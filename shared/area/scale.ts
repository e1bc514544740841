import type { Crs } from "#shared/projection/crs.ts";
import { metresPerDegree } from "#shared/projection/geodesic.ts";
import type { Position } from "#shared/projection/transformer.ts";

/** Metres for each unit of the two coordinates near a position of a system, for tolerances only. */
export function metresPerUnitAt(crs: Crs, position: Position): Position {
  if (crs.metresPerUnit !== null) return [crs.metresPerUnit, crs.metresPerUnit];
  const { lng, lat } = metresPerDegree(Math.min(89.9, Math.max(-89.9, position[1])));
  return [lng, lat];
}

/** Distance in metres of a position from a straight edge, and where along it (0 … 1) the nearest place lies. */
export function distanceToEdge(
  position: Position,
  from: Position,
  to: Position,
  scale: Position,
): { metres: number; along: number } {
  const [dx, dy] = [(to[0] - from[0]) * scale[0], (to[1] - from[1]) * scale[1]];
  const [px, py] = [(position[0] - from[0]) * scale[0], (position[1] - from[1]) * scale[1]];
  const length = dx * dx + dy * dy;
  const along = length === 0 ? 0 : Math.min(1, Math.max(0, (px * dx + py * dy) / length));
  return { metres: Math.hypot(px - along * dx, py - along * dy), along };
}
