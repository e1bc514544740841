import type { ReactNode } from "react";
import { LEGEND_SYMBOLS, type LegendSymbol } from "./legend-symbols.tsx";

/** One symbol of the sheet and what it means. */
export function LegendEntry({ symbol, children }: { readonly symbol: LegendSymbol; readonly children: ReactNode }) {
  return (
    <span className="q-legend-entry">
      <svg width="22" height="20" viewBox="0 0 22 20" aria-hidden="true">
        {LEGEND_SYMBOLS[symbol]}
      </svg>
      {children}
    </span>
  );
}
