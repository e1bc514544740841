import type { Distribution, DistributionBin } from "#shared/estimate/result.ts";
import { formatAsIs, formatNumber, formatPercent } from "../../components/ui/format.ts";
import { Table } from "../../components/ui/Table.tsx";

/** The numbers of the plot. */
export function DistributionTable({
  distribution,
  plural,
}: {
  readonly distribution: Distribution;
  readonly plural: string;
}) {
  const picks = distribution.bins.reduce((sum, bin) => sum + bin.picks, 0);
  return (
    <Table dense caption="Counts and how many picks had each">
      <thead>
        <tr>
          <th scope="col">{plural}</th>
          <th scope="col" className="q-num">
            Picks
          </th>
          <th scope="col" className="q-num">
            Share
          </th>
        </tr>
      </thead>
      <tbody>
        {distribution.bins
          .filter((bin) => bin.picks > 0)
          .map((bin) => (
            <tr key={bin.to}>
              <th scope="row">{binText(bin, distribution.kind)}</th>
              <td className="q-num">{formatNumber(bin.picks)}</td>
              <td className="q-num">{formatPercent(bin.picks / picks)}</td>
            </tr>
          ))}
      </tbody>
    </Table>
  );
}

/** "6–10" for whole counts; what was measured lies above one edge and up to the next. */
function binText({ from, to }: DistributionBin, kind: Distribution["kind"]): string {
  if (from === to) return formatAsIs(from);
  return kind === "whole"
    ? `${formatAsIs(from)}–${formatAsIs(to)}`
    : `above ${formatAsIs(from)}, at most ${formatAsIs(to)}`;
}
