import type { ReactNode } from "react";

/** One note of a margin column. */
export function MarginNote({ title, children }: { readonly title: ReactNode; readonly children: ReactNode }) {
  return (
    <div>
      <h3>{title}</h3>
      {children}
    </div>
  );
}
