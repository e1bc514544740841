import type { SurveySummary } from "#shared/api/surveys.ts";

const WIDTH = 68;
const HEIGHT = 56;
const MARGIN = 6;

/** The outline in degrees as a path in a small sheet; degrees of longitude are narrowed by the latitude. */
function outlinePath(outline: NonNullable<SurveySummary["outline"]>): string {
  const rings = outline.flat();
  const all = rings.flat();
  const first = all[0];
  if (first === undefined) return "";
  let [west, south] = first;
  let [east, north] = first;
  for (const [lng, lat] of all) {
    west = Math.min(west, lng);
    east = Math.max(east, lng);
    south = Math.min(south, lat);
    north = Math.max(north, lat);
  }
  const narrow = Math.max(0.05, Math.cos((((south + north) / 2) * Math.PI) / 180));
  const across = Math.max((east - west) * narrow, 1e-9);
  const up = Math.max(north - south, 1e-9);
  const scale = Math.min((WIDTH - 2 * MARGIN) / across, (HEIGHT - 2 * MARGIN) / up);
  const left = (WIDTH - across * scale) / 2;
  const top = (HEIGHT - up * scale) / 2;
  const point = ([lng, lat]: readonly [number, number]) =>
    `${(left + (lng - west) * narrow * scale).toFixed(1)} ${(top + (north - lat) * scale).toFixed(1)}`;
  return rings.map((ring) => `M${ring.map(point).join("L")}Z`).join("");
}

/** The study area as a small sheet; an empty one while there is no boundary. The words beside it say the same. */
export function SurveyThumbnail({ outline }: { readonly outline: SurveySummary["outline"] }) {
  return (
    <svg
      className="block flex-none"
      width={WIDTH}
      height={HEIGHT}
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      aria-hidden="true"
    >
      <rect x=".5" y=".5" width={WIDTH - 1} height={HEIGHT - 1} fill="var(--color-paper)" stroke="var(--color-ink)" />
      <path
        d="M17.5 1v54M34.5 1v54M51.5 1v54M1 14.5h66M1 28.5h66M1 42.5h66"
        stroke="var(--map-grid-line)"
        strokeWidth=".6"
      />
      {outline !== null && (
        <path
          d={outlinePath(outline)}
          fill="var(--color-land)"
          fillRule="evenodd"
          stroke="var(--map-boundary)"
          strokeWidth="1.4"
          strokeLinejoin="round"
        />
      )}
    </svg>
  );
}
