import { Problem } from "#shared/problem.ts";
import type { Crs } from "#shared/projection/crs.ts";
import { metresPerDegree } from "#shared/projection/geodesic.ts";
import type { Position, Transformer } from "#shared/projection/transformer.ts";

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

/** Datum shifts by parameters come home to about 2 cm. */
const COMES_HOME_METRES = 0.05;

/**
 * A projection used far from its place may give numbers that mean nothing, without saying so; there and back shows it.
 * @throws Problem crs-unsupported when a position does not come home to within 5 cm.
 */
export function checkComesHome({ forward, inverse }: Transformer, position: Position, from: Crs, to: Crs): void {
  const back = inverse(forward(position));
  const scale = metresPerUnitAt(from, position);
  const off = Math.hypot((back[0] - position[0]) * scale[0], (back[1] - position[1]) * scale[1]);
  if (off <= COMES_HOME_METRES) return;
  throw new Problem(
    "crs-unsupported",
    `The place ${position[0]}, ${position[1]} of ${from.name} cannot be shown in ${to.name}: there and back it is ${off.toPrecision(2)} m off. Choose a system that is made for this place.`,
  );
}
