import type { MarkProps } from "./mark-props.ts";
import type { VisitMarkState } from "./visit-states.ts";

const OUTLINES: Readonly<Record<VisitMarkState, { fill: string; stroke: string; dashed?: boolean }>> = {
  "not-visited": { fill: "none", stroke: "var(--color-flag)" },
  counted: { fill: "var(--color-count-3)", stroke: "var(--color-ink)" },
  zero: { fill: "var(--color-count-0)", stroke: "var(--color-ink)" },
  refused: { fill: "none", stroke: "var(--color-ochre)" },
  unsafe: { fill: "none", stroke: "var(--color-ochre)" },
  "not-reached": { fill: "none", stroke: "var(--color-ochre)", dashed: true },
  lost: { fill: "none", stroke: "var(--color-ochre)" },
  "not-in-population": { fill: "none", stroke: "var(--color-ink-3)" },
};

function inside(state: VisitMarkState) {
  switch (state) {
    case "not-visited":
    case "counted":
      return null;
    case "zero":
      return <circle cx="9" cy="9" r="3" fill="none" stroke="var(--color-ink)" strokeWidth="1.4" />;
    case "refused":
    case "not-reached":
      return <path d="M2 16 16 2" stroke="var(--color-ochre)" strokeWidth="1.75" />;
    case "unsafe":
      return <path d="M9 4.6v5.4M9 11.6v1.9" stroke="var(--color-ochre)" strokeWidth="2" />;
    case "lost":
      return (
        <path
          d="M6.6 7.2c0-3.4 5-3.2 5-.3 0 1.9-2.5 1.9-2.5 3.7M9.1 12.2v1.7"
          fill="none"
          stroke="var(--color-ochre)"
          strokeWidth="1.6"
        />
      );
    case "not-in-population":
      return <path d="m5.4 5.4 7.2 7.2M12.6 5.4l-7.2 7.2" stroke="var(--color-ink-3)" strokeWidth="1.6" />;
  }
}

/** A square, because it stands for a cell. Always beside words: see VisitStateLabel. */
export function VisitMark({ state, size = 18 }: MarkProps & { readonly state: VisitMarkState }) {
  const outline = OUTLINES[state];
  return (
    <svg width={size} height={size} viewBox="0 0 18 18" aria-hidden="true" className="flex-none">
      <rect
        x="2"
        y="2"
        width="14"
        height="14"
        fill={outline.fill}
        stroke={outline.stroke}
        strokeWidth="1.75"
        strokeDasharray={outline.dashed === true ? "3.5 2.2" : undefined}
      />
      {inside(state)}
    </svg>
  );
}
