import type { ReactNode } from "react";

/** What happened, in order, as stations on one line. Children: TimelineDay and TimelineEntry. */
export function Timeline({ label, children }: { readonly label: string; readonly children: ReactNode }) {
  return (
    <ol className="q-timeline" aria-label={label}>
      {children}
    </ol>
  );
}
