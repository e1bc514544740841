import type { ReactNode } from "react";

/** Printed only: a double rule with what this is, and which draw, frame version and date. */
export function PrintHead({ title, note }: { readonly title: ReactNode; readonly note: ReactNode }) {
  return (
    <div className="q-print-only q-print-head">
      <b>{title}</b>
      <span>{note}</span>
    </div>
  );
}
