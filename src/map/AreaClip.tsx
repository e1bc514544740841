import { useMemo } from "react";
import { pathOfRings, type PlanePolygons, type SheetScale } from "./sheet-geometry.ts";

/** A clip path of the area's inside, for tints that stop at the boundary. */
export function AreaClip({
  id,
  polygons,
  at,
}: {
  readonly id: string;
  readonly polygons: PlanePolygons;
  readonly at: SheetScale;
}) {
  const { scale, anchorEast, anchorNorth } = at;
  const path = useMemo(
    () => pathOfRings(polygons.flat(), { scale, anchorEast, anchorNorth }),
    [polygons, scale, anchorEast, anchorNorth],
  );
  return (
    <clipPath id={id}>
      <path d={path} clipRule="evenodd" />
    </clipPath>
  );
}
