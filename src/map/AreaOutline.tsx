import { useMemo } from "react";
import { useSheet } from "./sheet-context.ts";
import { SheetLayer } from "./SheetLayer.tsx";
import { pathOfRings, type PlanePolygons } from "./sheet-geometry.ts";

interface AreaOutlineProps {
  /** Whole millimetres of the sheet's plane; rings after the first of a polygon are holes. */
  readonly polygons: PlanePolygons;
}

/** The study area: tint, boundary 1.75 px, holes as water with fine lines. */
export function AreaOutline({ polygons }: AreaOutlineProps) {
  const { view, id } = useSheet();
  const { scale, anchorEast, anchorNorth } = view;
  const paths = useMemo(() => {
    const at = { scale, anchorEast, anchorNorth };
    return {
      all: pathOfRings(polygons.flat(), at),
      holes: pathOfRings(
        polygons.flatMap((polygon) => polygon.slice(1)),
        at,
      ),
    };
  }, [polygons, scale, anchorEast, anchorNorth]);
  return (
    <>
      <SheetLayer slot="tint">
        <path d={paths.all} fill="var(--color-land)" fillRule="evenodd" />
      </SheetLayer>
      <SheetLayer slot="hole">
        <defs>
          <pattern id={`${id}-water`} width="40" height="6" patternUnits="userSpaceOnUse">
            <path d="M2 1.5h15M24 4.5h12" stroke="var(--color-ink-3)" strokeWidth=".5" opacity=".65" />
          </pattern>
        </defs>
        <path d={paths.holes} fill="var(--map-hole)" />
        <path d={paths.holes} fill={`url(#${id}-water)`} />
      </SheetLayer>
      <SheetLayer slot="boundary">
        <path d={paths.all} fill="none" stroke="var(--map-boundary)" strokeWidth="1.75" strokeLinejoin="round" />
      </SheetLayer>
    </>
  );
}
