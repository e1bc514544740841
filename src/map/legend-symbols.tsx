import type { ReactNode } from "react";
import { COUNT_CLASSES } from "./count-classes.ts";

export type LegendSymbol =
  | "boundary"
  | "area"
  | "hole"
  | "left-out"
  | "whole-cell"
  | "edge-cell"
  | "drawn"
  | "repeat"
  | "reserve"
  | "chosen"
  | "question"
  | "not-counted"
  | "not-visited"
  | `count-${0 | 1 | 2 | 3 | 4 | 5}`;

function square(fill: string, stroke: string, width = 1, dash?: string) {
  return (
    <rect x="2" y="2" width="17" height="16" fill={fill} stroke={stroke} strokeWidth={width} strokeDasharray={dash} />
  );
}

function land(fill: string, stroke: string) {
  return <rect x="2" y="4" width="17" height="12" fill={fill} stroke={stroke} />;
}

const counts = Object.fromEntries(
  COUNT_CLASSES.map((one, index) => [
    `count-${index}`,
    <g key={index}>
      {square(one.fill, "var(--color-ink)")}
      {index === 0 && <circle cx="10.5" cy="10" r="3" fill="none" stroke="var(--color-ink)" strokeWidth="1.4" />}
    </g>,
  ]),
) as Record<`count-${0 | 1 | 2 | 3 | 4 | 5}`, ReactNode>;

/** The symbols of the sheet as small drawings, 22 × 20 px. */
export const LEGEND_SYMBOLS: Readonly<Record<LegendSymbol, ReactNode>> = {
  ...counts,
  boundary: <path d="M2 10h17" stroke="var(--map-boundary)" strokeWidth="1.75" />,
  area: land("var(--color-land)", "var(--color-ink)"),
  hole: (
    <>
      {land("var(--map-hole)", "var(--color-ink)")}
      <path d="M5 8h8M9 12h8" stroke="var(--color-ink-3)" strokeWidth="0.6" />
    </>
  ),
  "left-out": (
    <>
      {land("none", "var(--color-ink)")}
      <path d="M3 12 10 5M5 15.5 15.5 5M10.5 15.5 18.5 8M15.5 15.5l3-3" stroke="var(--map-left-out)" strokeWidth="1" />
    </>
  ),
  "whole-cell": land("var(--color-land)", "var(--map-cell-line)"),
  "edge-cell": land("var(--map-edge-cell)", "var(--map-cell-line)"),
  drawn: (
    <>
      {square("var(--color-flag-tint)", "var(--map-drawn)", 1.75)}
      <text x="10.5" y="14.3" textAnchor="middle" fontSize="12" fontWeight="600" fill="var(--color-ink)">
        7
      </text>
    </>
  ),
  repeat: (
    <>
      <rect x="0" y="1.5" width="22" height="17" rx="8.5" fill="var(--map-drawn)" />
      <text x="11" y="14.2" textAnchor="middle" fontSize="12" fontWeight="700" fill="var(--color-paper)">
        ×2
      </text>
    </>
  ),
  reserve: square("none", "var(--map-reserve)", 1.25, "3 2"),
  chosen: square("none", "var(--color-ink)", 2),
  question: <circle cx="10.5" cy="10" r="7" fill="none" stroke="var(--color-ochre)" strokeWidth="2" />,
  "not-counted": (
    <>
      {square("var(--color-paper)", "var(--map-not-counted)", 1.75)}
      <path d="M2 18 19 2" stroke="var(--map-not-counted)" strokeWidth="1.75" />
    </>
  ),
  "not-visited": square("none", "var(--map-drawn)", 1.75),
};
