import type { Declaration, DrawDetail, DrawEntry } from "#shared/api/draw.ts";
import { formatCount, formatNumber, formatPercent } from "../../components/ui/format.ts";
import type { Draws } from "./past-declarations.ts";

export type RedrawReason = NonNullable<Draws["reasonNeeded"]>;

export const DESIGN_TITLES = {
  "srs-wr": "Simple random, with replacement",
  "srs-wor": "Simple random, without replacement",
} as const satisfies Record<Declaration["design"]["kind"], string>;

export const DESIGN_TEXTS = {
  "srs-wr":
    "Every pick is made from the whole frame. A cell may be picked twice: it is visited once, and its count enters twice. The simplest to defend.",
  "srs-wor":
    "No cell twice. A little more precise where the cells drawn are a good part of the frame; reserves then are other cells too.",
} as const satisfies Record<Declaration["design"]["kind"], string>;

export const LIMITS_TITLES = { "log-normal": "Log-normal limits", t: "Student t limits" } as const satisfies Record<
  Declaration["limits"],
  string
>;

export const LIMITS_TEXTS = {
  "log-normal":
    "Recommended for counts: clumped counts make t limits miss the truth, nearly always from below. These stay above zero.",
  t: "The textbook's form, as far below as above. With clumped counts its lower limit may fall below zero.",
} as const satisfies Record<Declaration["limits"], string>;

/** "60 picks, 57 cells to visit". */
export function picksSentence(draw: Pick<DrawDetail, "picks" | "cellsToVisit">): string {
  return `${formatCount(draw.picks, "pick")}, ${formatCount(draw.cellsToVisit, "cell")} to visit`;
}

/** What the repeats mean, or that there are none. */
export function repeatsSentence(entries: readonly DrawEntry[], withReplacement: boolean): string {
  const used = entries.filter((entry) => entry.state === "in-use");
  const times = new Map<number, number>();
  for (const { unit } of used) times.set(unit, (times.get(unit) ?? 0) + 1);
  const repeated = [...times.values()].filter((count) => count > 1).length;
  if (!withReplacement) return "Each cell was picked once: the draw was without replacement.";
  if (repeated === 0) return "No cell was picked twice this time.";
  return `${formatCount(repeated, "cell was", "cells were")} picked more than once: visited once, entered in the estimate each time.`;
}

/** How much of the frame is drawn. */
export function shareSentence(n: number, units: number): string {
  return `${formatNumber(n)} of ${formatNumber(units)} cells is ${formatPercent(n / units)} of the frame.`;
}

/** Why a further draw has to say why it is made, and what it will be. */
export function redrawLead(reason: RedrawReason, drawsOnFrame: number): { title: string; text: string } {
  const text = `This will be draw ${drawsOnFrame + 1} on this frame. All draws stay on record.`;
  switch (reason) {
    case "waypoints-exported":
      return { title: "Waypoints of an earlier draw were handed out.", text };
    case "third-draw-in-a-day":
      return { title: "Two seeds were given here within a day.", text };
  }
}

/** Where a seed comes from, said plainly. */
export function seedOrigin(declaration: Declaration): string {
  if (declaration.seedSource === "made-here")
    return "20 digits from this server’s random source, after the declaration";
  const by = declaration.seed?.by ?? "the planner";
  return `Typed. The seed was chosen by ${by}; nothing shows that only one was tried.`;
}
