import { useId } from "react";
import { FEN_DRAWN, FEN_OUTLINE, FEN_WATER, FEN_ZONE } from "./sheet-drawing.ts";

const CELL = 18;
const WEST = 57;
const NORTH = 116;
const STEP = 90;

const verticals = Array.from({ length: 7 }, (_, index) => WEST + index * STEP);
const horizontals = Array.from({ length: 7 }, (_, index) => NORTH + index * STEP);
const cellLines = Array.from(
  { length: 35 },
  (_, k) => `M${WEST + k * CELL} 44V728M48 ${NORTH + (k - 1) * CELL}H680`,
).join("");
const drawn = FEN_DRAWN.flatMap(([row, columns]) =>
  columns.map((column) => ({ x: WEST + column * CELL, y: NORTH + row * CELL })),
);
const bars = [
  ...verticals.map((x) => `M${x} 41.5h45M${x} 730.5h45`),
  ...horizontals.map((y) => `M45.5 ${y}v-45M682.5 ${y}v-45`),
].join("");

/** The ground of the sheet: grid, cells, water, a zone left out, drawn cells, boundary. */
function Ground({ id }: { readonly id: string }) {
  return (
    <g clipPath={`url(#${id}-sheet)`}>
      <path
        d={verticals.map((x) => `M${x} 44v684`).join("") + horizontals.map((y) => `M48 ${y}h632`).join("")}
        stroke="var(--map-grid-line)"
        strokeWidth=".6"
      />
      <path d={FEN_OUTLINE} fill="var(--color-land)" />
      <path d={cellLines} clipPath={`url(#${id}-area)`} stroke="var(--map-cell-line)" strokeWidth=".5" />
      <path d={FEN_WATER} fill="var(--map-hole)" />
      <path d={FEN_WATER} fill={`url(#${id}-water)`} />
      <path d={FEN_ZONE} fill="var(--color-paper)" />
      <path d={FEN_ZONE} fill={`url(#${id}-hatch)`} />
      {drawn.map(({ x, y }) => (
        <rect
          key={`${x} ${y}`}
          x={x}
          y={y}
          width={CELL}
          height={CELL}
          fill="var(--color-flag-tint)"
          stroke="var(--map-drawn)"
          strokeWidth="1.75"
        />
      ))}
      <path d={FEN_OUTLINE + FEN_WATER + FEN_ZONE} fill="none" stroke="var(--map-boundary)" strokeWidth="1.75" />
      <text x="412" y="345" textAnchor="middle" className="q-drawing-water">
        Long Mere
      </text>
    </g>
  );
}

function Margin() {
  return (
    <>
      <rect x="48" y="44" width="632" height="684" fill="none" stroke="var(--map-neatline)" strokeWidth=".8" />
      <rect x="43" y="39" width="642" height="694" fill="none" stroke="var(--map-neatline)" strokeWidth="1.6" />
      <path d={bars} stroke="var(--map-neatline)" strokeWidth="2.2" />
      <g className="q-drawing-figures">
        {verticals.slice(1).map((x, index) => (
          <text key={x} x={x} y="34" fontWeight="700">
            {300 + index * 100}
          </text>
        ))}
        {horizontals.map((y, index) => (
          <text key={y} transform={`translate(38 ${y}) rotate(-90)`} fontWeight="700">
            {900 - index * 100}
          </text>
        ))}
      </g>
    </>
  );
}

/** What the product is about, as a printed sheet: ground, cells, those drawn. Decoration: the words beside it say the same. */
export function SignInSheet() {
  const id = useId().replaceAll(":", "");
  return (
    <svg className="q-sign-in-sheet" viewBox="0 0 720 800" preserveAspectRatio="xMidYMid slice" aria-hidden="true">
      <defs>
        <clipPath id={`${id}-sheet`}>
          <rect x="48" y="44" width="632" height="684" />
        </clipPath>
        <clipPath id={`${id}-area`}>
          <path d={FEN_OUTLINE} />
        </clipPath>
        <pattern id={`${id}-hatch`} width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <path d="M0 0V5" stroke="var(--map-left-out)" />
        </pattern>
        <pattern id={`${id}-water`} width="40" height="6" patternUnits="userSpaceOnUse">
          <path d="M2 1.5h15M24 4.5h12" stroke="var(--color-ink-3)" strokeWidth=".5" opacity=".65" />
        </pattern>
      </defs>
      <Ground id={id} />
      <Margin />
      <text x="52" y="771" className="q-drawing-caption">
        Pellimere Fen, 741 cells, 57 to visit
      </text>
    </svg>
  );
}
