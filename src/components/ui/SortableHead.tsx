import type { ReactNode } from "react";
import { SortArrow } from "./SortArrow.tsx";

export type SortDirection = "ascending" | "descending";

interface SortableHeadProps {
  readonly children: ReactNode;
  readonly sorted: SortDirection | false;
  readonly onSort: () => void;
  readonly numeric?: boolean;
}

/** A column head that sorts: a button in the head, its state said by aria-sort and drawn as an arrow. */
export function SortableHead({ children, sorted, onSort, numeric = false }: SortableHeadProps) {
  return (
    <th scope="col" aria-sort={sorted === false ? "none" : sorted} className={numeric ? "q-num" : undefined}>
      <button type="button" className="q-sort" onClick={onSort}>
        {children}
        <SortArrow down={sorted === "descending"} />
      </button>
    </th>
  );
}
