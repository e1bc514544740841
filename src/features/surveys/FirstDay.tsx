import type { ReactNode } from "react";

const CORNERS = "56,190 66,80 112,38 186,50 250,88 240,168 174,206";

function EmptySheet() {
  return (
    <svg className="block h-auto max-w-full" width="300" height="248" viewBox="0 0 300 248" aria-hidden="true">
      <rect x="5" y="5" width="290" height="238" fill="none" stroke="var(--map-neatline)" strokeWidth="1.6" />
      <rect
        x="10"
        y="10"
        width="280"
        height="228"
        fill="var(--color-paper)"
        stroke="var(--map-neatline)"
        strokeWidth=".8"
      />
      <path
        d="M66 10v228M124 10v228M182 10v228M240 10v228M10 66h280M10 124h280M10 182h280"
        stroke="var(--map-grid-line)"
        strokeWidth=".6"
      />
      <polygon points={CORNERS} fill="none" stroke="var(--map-boundary)" strokeWidth="1.5" strokeDasharray="5 4" />
      {CORNERS.split(" ").map((corner) => {
        const [x, y] = corner.split(",");
        return (
          <circle
            key={corner}
            cx={x}
            cy={y}
            r="4.5"
            fill="var(--color-paper)"
            stroke="var(--map-boundary)"
            strokeWidth="1.5"
          />
        );
      })}
      <text x="152" y="130" textAnchor="middle" className="q-drawing-water">
        your study area
      </text>
    </svg>
  );
}

/** The surveys page on the first day: what a survey needs, in order, and the way to start one. */
export function FirstDay({ actions }: { readonly actions: ReactNode }) {
  return (
    <div className="q-first-day">
      <EmptySheet />
      <div>
        <h1 className="q-first-day-title">No surveys yet. Start with the ground.</h1>
        <p>
          A survey is one study area and what is counted there. Nothing is fixed until you seal a frame, so try things
          out.
        </p>
        <ol>
          <li>
            <span>1</span>
            <b>A boundary</b>
            <span>a GeoJSON, KML or zipped shapefile from your map program</span>
          </li>
          <li>
            <span>2</span>
            <b>What is counted</b>
            <span>a word will do: “spikes”, “burrow entrances”</span>
          </li>
          <li>
            <span>3</span>
            <b>A size of cell</b>
            <span>what one person can count completely in one visit</span>
          </li>
        </ol>
        <div className="flex flex-wrap gap-3">{actions}</div>
      </div>
    </div>
  );
}
