import type { FrameSummary } from "#shared/api/frame.ts";
import type { EdgePresetName } from "#shared/frame/cell-spec.ts";
import { formatHectares, formatNumber } from "../../components/ui/format.ts";
import { Table } from "../../components/ui/Table.tsx";
import { PRESET_TITLES } from "./frame-words.ts";

interface FrameAreasProps {
  readonly preset: EdgePresetName;
  readonly summary: FrameSummary;
}

/** What the cells cover and what they miss, in hectares and per cent of the study area. */
export function FrameAreas({ preset, summary }: FrameAreasProps) {
  const { areaM2, uncoveredM2, outsideM2 } = summary;
  const rows = [
    { name: "Study area", area: areaM2 },
    { name: "Area that no cell stands for", area: uncoveredM2 },
    { name: "Cell outside the boundary", area: outsideM2 },
  ];
  return (
    <Table caption="What the cells cover" dense>
      <thead>
        <tr>
          <th scope="col">With {PRESET_TITLES[preset].toLowerCase()}</th>
          <th scope="col" className="q-num">
            ha
          </th>
          <th scope="col" className="q-num">
            % of area
          </th>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row.name}>
            <th scope="row">{row.name}</th>
            <td className="q-num">{formatHectares(row.area)}</td>
            <td className="q-num">{areaM2 > 0 ? formatNumber((100 * row.area) / areaM2, 1) : "no area"}</td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
