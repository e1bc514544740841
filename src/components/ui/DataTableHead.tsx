import type { DataColumn } from "./data-column.ts";
import { SortableHead, type SortDirection } from "./SortableHead.tsx";

interface DataTableHeadProps<Row> {
  readonly columns: readonly DataColumn<Row>[];
  readonly sorted: (column: string) => SortDirection | false;
  readonly sortBy: (column: string) => void;
}

/** The head of a DataTable: columns with `sortBy` are buttons. */
export function DataTableHead<Row>({ columns, sorted, sortBy }: DataTableHeadProps<Row>) {
  return (
    <thead className="q-data-head">
      <tr>
        {columns.map((column) =>
          column.sortBy === undefined ? (
            <th key={column.id} scope="col" className={column.numeric === true ? "q-num" : undefined}>
              {column.head}
            </th>
          ) : (
            <SortableHead
              key={column.id}
              sorted={sorted(column.id)}
              onSort={() => sortBy(column.id)}
              numeric={column.numeric === true}
            >
              {column.head}
            </SortableHead>
          ),
        )}
      </tr>
    </thead>
  );
}
