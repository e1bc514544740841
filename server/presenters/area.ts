import type { AreaVersion, PlaneRings } from "#shared/api/area.ts";
import type { AreaHead, PlaneRow } from "../db/areas.ts";

export function presentArea(area: AreaHead, names: ReadonlyMap<string, string>): AreaVersion {
  return {
    id: area.id,
    number: area.number,
    importedAt: area.createdAt,
    importedBy: names.get(area.importedBy) ?? "somebody",
    report: area.report as AreaVersion["report"],
    outline: area.outline as AreaVersion["outline"],
    outlineSimplified: area.outlineSimplified,
    suggestedCrs: area.suggestedCrs as AreaVersion["suggestedCrs"],
  };
}

export function presentPlane(plane: PlaneRow): PlaneRings {
  return {
    areaId: plane.areaVersionId,
    crs: { text: plane.crsText, epsg: plane.epsg, name: plane.crsName },
    rings: JSON.parse(plane.rings) as PlaneRings["rings"],
    ringsSha256: plane.ringsSha256,
    planeAreaM2: plane.planeAreaSquareMetres,
    geodesicAreaM2: plane.geodesicAreaSquareMetres,
    notes: plane.notes as string[],
    net: plane.net as PlaneRings["net"],
  };
}
