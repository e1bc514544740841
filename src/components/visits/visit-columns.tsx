import type { Visit } from "#shared/api/field.ts";
import { ordersText } from "../../api/visit-words.ts";
import type { DataColumn } from "../ui/data-column.ts";
import { formatNumber } from "../ui/format.ts";
import { RepeatBadge } from "../ui/RepeatBadge.tsx";

/** Which cell it is: label, unit, every place in the draw. The first columns of each list of cells to visit. */
export const VISIT_COLUMNS: readonly DataColumn<Visit>[] = [
  { id: "cell", head: "Cell", sortBy: (visit) => visit.label, cell: (visit) => <b>{visit.label}</b> },
  {
    id: "unit",
    head: "Unit",
    numeric: true,
    sortBy: (visit) => visit.unit,
    cell: (visit) => formatNumber(visit.unit),
  },
  {
    id: "order",
    head: "Draw order",
    sortBy: (visit) => visit.orders[0],
    cell: (visit) => (
      <span className="q-state">
        {ordersText(visit.orders)}
        {visit.orders.length > 1 && <RepeatBadge times={visit.orders.length} />}
      </span>
    ),
  },
];
