interface SmallOutlineProps {
  /** [polygon][ring][vertex][x, y] in any one unit with y up; null draws an empty sheet. */
  readonly polygons: readonly (readonly (readonly (readonly [number, number])[])[])[] | null;
  /** Degrees are narrowed by the cosine of the latitude. */
  readonly degrees?: boolean;
  /** Places of drawn cells, in the same unit. */
  readonly marks?: readonly (readonly [number, number])[];
}

const WIDTH = 68;
const HEIGHT = 56;
const ROOM = 6;

/** A thumbnail of a study area: an outline on a ruled sheet. Decoration beside the survey's name, so it has no text of its own. */
export function SmallOutline({ polygons, degrees = false, marks = [] }: SmallOutlineProps) {
  const vertices = (polygons ?? []).flat(2);
  const draw = vertices.length === 0 ? null : fitted(vertices, degrees);
  const path = (rings: readonly (readonly (readonly [number, number])[])[]) =>
    draw === null ? "" : rings.map((ring) => `M${thinned(ring.map(draw)).join("L")}Z`).join("");
  return (
    <svg
      className="block flex-none"
      width={WIDTH}
      height={HEIGHT}
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      aria-hidden="true"
    >
      <rect
        x=".75"
        y=".75"
        width={WIDTH - 1.5}
        height={HEIGHT - 1.5}
        fill="var(--color-paper)"
        stroke="var(--color-ink)"
        strokeWidth="1"
      />
      <path
        d="M17.5 1v54M34.5 1v54M51.5 1v54M1 14.5h66M1 28.5h66M1 42.5h66"
        stroke="var(--map-grid-line)"
        strokeWidth=".5"
      />
      {polygons !== null && (
        <>
          <path
            d={path(polygons.flat())}
            fill="var(--color-land)"
            fillRule="evenodd"
            stroke="var(--color-ink)"
            strokeWidth="1.4"
            strokeLinejoin="round"
          />
          <path
            d={path(polygons.flatMap((polygon) => polygon.slice(1)))}
            fill="var(--map-hole)"
            stroke="var(--color-ink)"
            strokeWidth="1"
          />
        </>
      )}
      {draw !== null &&
        marks.map((mark, index) => {
          const [x, y] = draw(mark);
          return (
            <rect
              key={index}
              x={x - 2}
              y={y - 2}
              width="4"
              height="4"
              fill="var(--color-flag-tint)"
              stroke="var(--color-flag)"
              strokeWidth="1.2"
            />
          );
        })}
    </svg>
  );
}

/** From the outline's unit to px of the thumbnail, whole outline in sight. */
function fitted(
  vertices: readonly (readonly [number, number])[],
  degrees: boolean,
): (vertex: readonly [number, number]) => [number, number] {
  let [west, south, east, north] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [x, y] of vertices) {
    west = Math.min(west, x);
    east = Math.max(east, x);
    south = Math.min(south, y);
    north = Math.max(north, y);
  }
  const narrow = degrees ? Math.max(0.01, Math.cos((((south + north) / 2) * Math.PI) / 180)) : 1;
  const across = Math.max((east - west) * narrow, 1e-12);
  const up = Math.max(north - south, 1e-12);
  const scale = Math.min((WIDTH - 2 * ROOM) / across, (HEIGHT - 2 * ROOM) / up);
  return ([x, y]) => [
    WIDTH / 2 + (x - (west + east) / 2) * narrow * scale,
    HEIGHT / 2 - (y - (south + north) / 2) * scale,
  ];
}

/** Vertices of a thumbnail less than half a px apart add nothing. */
function thinned(places: readonly [number, number][]): string[] {
  const kept: string[] = [];
  let last: [number, number] = [NaN, NaN];
  for (const place of places) {
    if (Math.abs(place[0] - last[0]) < 0.5 && Math.abs(place[1] - last[1]) < 0.5) continue;
    kept.push(`${place[0].toFixed(1)} ${place[1].toFixed(1)}`);
    last = place;
  }
  return kept;
}
