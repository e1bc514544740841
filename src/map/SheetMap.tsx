import { createLeafletContext, LeafletContext } from "@react-leaflet/core";
import "leaflet/dist/leaflet.css";
import { use, useId, useMemo, useRef, useState, type CSSProperties, type ReactNode } from "react";
import { BaseMapContext } from "./base-map-context.ts";
import { BaseMapTiles } from "./BaseMapTiles.tsx";
import type { LngLatOf } from "./planes.ts";
import { ScaleBar } from "./ScaleBar.tsx";
import { SheetBorder } from "./SheetBorder.tsx";
import { SheetContext, type Sheet, type SheetSlot } from "./sheet-context.ts";
import { SheetFoot } from "./SheetFoot.tsx";
import type { PlaneBounds } from "./sheet-geometry.ts";
import { SheetGrid } from "./SheetGrid.tsx";
import { marginsFor } from "./sheet-margins.ts";
import { SheetTools } from "./SheetTools.tsx";
import { useElementSize } from "../components/ui/use-element-size.ts";
import { usePlanarMap, type PlanarMap } from "./use-planar-map.ts";
import { usePress } from "./use-press.ts";

interface SheetMapProps {
  /** What the sheet shows, for screen readers; the same is in a table or list beside it. */
  readonly label: string;
  /** The area to show whole, in metres of the plane. */
  readonly bounds: PlaneBounds;
  /** The plane's CRS; null for a plane of its own before one is chosen: then only the graticule is drawn. */
  readonly crsName: string | null;
  readonly lngLatOf?: LngLatOf | undefined;
  /** Below the sheet: LegendEntry elements. */
  readonly legend?: ReactNode;
  /** Height in px; without it the sheet takes the height of its place. */
  readonly height?: number | undefined;
  /** Layers: AreaOutline, FrameCellsLayer, PicksLayer, CountsLayer … */
  readonly children?: ReactNode;
}

const UPPER_SLOTS: readonly SheetSlot[] = ["hole", "fill", "drawn", "boundary", "figures", "chosen"];

/** px from the view's anchor to px of the sheet. */
function shiftOf({ view, window }: PlanarMap): { readonly svg: string; readonly css: string } {
  const x = (view.anchorEast - window.west) * window.scale;
  const y = (window.north - view.anchorNorth) * window.scale;
  return { svg: `translate(${x} ${y})`, css: `translate(${x}px, ${y}px)` };
}

/** On a phone the bar lies inside the sheet. */
function ScaleInside({ scale }: { readonly scale: number }) {
  return (
    <div className="q-sheet-scale-inside">
      <ScaleBar scale={scale} widest={90} parts={1} />
    </div>
  );
}

/** What the layers are told, once map and slots are there; the same object until the view changes. */
function useSheetValue(
  planar: PlanarMap | null,
  under: SVGSVGElement | null,
  over: SVGSVGElement | null,
): Sheet | null {
  const id = useId().replaceAll(":", "");
  const map = planar?.map;
  const view = planar?.view;
  const onPress = usePress(map);
  return useMemo(() => {
    if (view === undefined || under === null || over === null) return null;
    const slot = (name: SheetSlot) =>
      (name === "tint" ? under : over).querySelector<SVGGElement>(`g[data-slot="${name}"]`);
    return { view, slot, id, onPress };
  }, [view, under, over, id, onPress]);
}

/** The map as a printed sheet: neat line, alternating bar, figures in the margin, scale bar, north, legend; it needs no base map and no network. The owner's base map, where there is one, lies below all else. */
export function SheetMap({ label, bounds, crsName, lngLatOf, legend, height, children }: SheetMapProps) {
  const paper = useRef<HTMLDivElement>(null);
  const container = useRef<HTMLDivElement>(null);
  const [under, setUnder] = useState<SVGSVGElement | null>(null);
  const [over, setOver] = useState<SVGSVGElement | null>(null);
  const size = useElementSize(paper);
  const margins = marginsFor(size.width, lngLatOf !== undefined);
  const planar = usePlanarMap(container, bounds);
  const sheet = useSheetValue(planar, under, over);
  const map = planar?.map;
  const leaflet = useMemo(() => (map === undefined ? null : createLeafletContext(map)), [map]);
  const seen = planar?.window;
  const shift = planar === null ? undefined : shiftOf(planar);
  const inMetres = crsName !== null;
  const baseMap = use(BaseMapContext);
  return (
    <figure
      className="q-sheet"
      style={{ ...(height !== undefined && { height }), "--sheet-width": size.width || 640 } as CSSProperties}
      aria-label={label}
    >
      <div ref={paper} className="q-sheet-paper">
        <div
          className="q-sheet-inner"
          style={{ left: margins.left, right: margins.right, top: margins.top, bottom: margins.bottom }}
        >
          {planar !== null && shift !== undefined && lngLatOf !== undefined && (
            <BaseMapTiles view={planar.view} shift={shift.css} lngLatOf={lngLatOf} />
          )}
          <svg ref={setUnder} className="q-sheet-under" aria-hidden="true">
            {seen !== undefined && <SheetGrid window={seen} inMetres={inMetres} lngLatOf={lngLatOf} />}
            <g transform={shift?.svg}>
              <g data-slot="tint" />
            </g>
          </svg>
          <div
            ref={container}
            className="q-sheet-map"
            role="application"
            aria-label={`${label}. Arrow keys move the map, plus and minus zoom.`}
          />
          <svg ref={setOver} className="q-sheet-over" role="group" aria-label={`On the map: ${label}`}>
            <g transform={shift?.svg}>
              {UPPER_SLOTS.map((name) => (
                <g key={name} data-slot={name} />
              ))}
            </g>
          </svg>
        </div>
        {seen !== undefined && (
          <SheetBorder window={seen} margins={margins} size={size} inMetres={inMetres} lngLatOf={lngLatOf} />
        )}
        {planar !== null && (
          <SheetTools
            map={planar.map}
            onWhole={() => container.current?.dispatchEvent(new Event("sheet:whole"))}
            margins={margins}
            compact={margins.compact}
          />
        )}
        {seen !== undefined && margins.compact && <ScaleInside scale={seen.scale} />}
        {sheet !== null && leaflet !== null && (
          <LeafletContext value={leaflet}>
            <SheetContext value={sheet}>{children}</SheetContext>
          </LeafletContext>
        )}
      </div>
      {seen !== undefined && (
        <SheetFoot
          window={seen}
          compact={margins.compact}
          narrow={size.width < 680}
          crsName={crsName}
          legend={legend}
          attribution={lngLatOf === undefined ? undefined : baseMap?.attribution}
        />
      )}
    </figure>
  );
}
