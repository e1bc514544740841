import type { ReactNode } from "react";

/** Printed only, at the end: frame hash and seed at the left, newest event at the right. */
export function PrintFoot({ children, note }: { readonly children: ReactNode; readonly note?: ReactNode }) {
  return (
    <div className="q-print-only q-print-foot">
      <span>{children}</span>
      {note !== undefined && <span>{note}</span>}
    </div>
  );
}
