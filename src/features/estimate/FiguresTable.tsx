import type { EstimateResult } from "#shared/estimate/result.ts";
import { Figure } from "../../components/ui/Figure.tsx";
import { Table } from "../../components/ui/Table.tsx";
import { figuresRows } from "./figure-words.ts";

/** Total, mean and density with their errors and limits, decimals under decimals. */
export function FiguresTable({ result, plural }: { readonly result: EstimateResult; readonly plural: string }) {
  const rows = figuresRows(result, plural);
  const columns = ["estimate", "standardError", "lower", "upper"] as const;
  const decimals = columns.map((column) => Math.max(...rows.map((row) => decimalsOf(row[column]))));
  return (
    <Table sticky caption="Estimates with their precision">
      <thead>
        <tr>
          <th scope="col">Quantity</th>
          {["Estimate", "Standard error", "Lower", "Upper"].map((head) => (
            <th key={head} scope="col" className="q-num">
              {head}
            </th>
          ))}
          <th scope="col">Unit</th>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row.name} data-tone={row.strong ? "strong" : undefined}>
            <th scope="row" className="whitespace-nowrap">
              {row.name}
            </th>
            {columns.map((column, index) => (
              <td key={column} className="q-num">
                <Figure decimals={decimals[index] ?? 0}>{row[column]}</Figure>
              </td>
            ))}
            <td className="whitespace-nowrap">{row.unit}</td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}

function decimalsOf(text: string): number {
  return /\.(\d+)$/.exec(text)?.[1]?.length ?? 0;
}
