import type { ReactNode } from "react";
import type { AreaVersion } from "#shared/api/area.ts";
import { formatArea, formatCount } from "../../components/ui/format.ts";

type Report = AreaVersion["report"];

/** "1 polygon, 1 hole, 126 vertices" */
function foundText({ parts, holes, vertices }: Pick<Report, "parts" | "holes" | "vertices">): string {
  return [
    formatCount(parts, "polygon"),
    ...(holes === 0 ? [] : [formatCount(holes, "hole")]),
    formatCount(vertices, "vertex", "vertices"),
  ].join(", ");
}

function Row({ name, children }: { readonly name: string; readonly children: ReactNode }) {
  return (
    <div>
      <dt>{name}</dt>
      <dd>{children}</dd>
    </div>
  );
}

function Sentences({ lines }: { readonly lines: readonly string[] }) {
  return lines.length === 1 ? (
    <>{lines[0]}</>
  ) : (
    <ul>
      {lines.map((line) => (
        <li key={line}>{line}</li>
      ))}
    </ul>
  );
}

/** What an import found, mended and left aside, and how the system of its coordinates was known. */
export function ImportReportList({ report }: { readonly report: Report }) {
  return (
    <dl className="q-report">
      <Row name="Found">
        <b>{foundText(report)}.</b> {formatArea(report.geodesicAreaM2)} on the ellipsoid.
        {report.features > 1 && ` From ${formatCount(report.features, "feature")}.`}
      </Row>
      <Row name="System">
        <b>{report.crs.name}</b>
        {report.crs.epsg !== null && <code> EPSG:{report.crs.epsg}</code>}
        <br />
        {report.crs.howKnown}
      </Row>
      <Row name="Mended">
        {report.mended.length === 0 ? "Nothing had to be mended." : <Sentences lines={report.mended} />}
      </Row>
      {report.ignored.length > 0 && (
        <Row name="Left aside">
          <Sentences lines={report.ignored} />
        </Row>
      )}
      {report.notes.length > 0 && (
        <Row name="Noted">
          <Sentences lines={report.notes} />
        </Row>
      )}
    </dl>
  );
}
