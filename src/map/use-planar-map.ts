import type { Map as LeafletMap, Point } from "leaflet";
import { useEffect, useRef, useState, type RefObject } from "react";
import { flushSync } from "react-dom";
import { createPlanarMap, fitWhole } from "./planar-map.ts";
import type { SheetView } from "./sheet-context.ts";
import type { PlaneBounds } from "./sheet-geometry.ts";

/** Where the sheet lies: its edges in metres. Changes with every step of a drag. */
export interface SheetWindow extends PlaneBounds {
  readonly scale: number;
}

export interface PlanarMap {
  readonly map: LeafletMap;
  readonly view: SheetView;
  readonly window: SheetWindow;
}

function windowOf(map: LeafletMap): SheetWindow {
  const size = map.getSize();
  const upperLeft = map.containerPointToLatLng([0, 0]);
  const scale = 2 ** map.getZoom();
  return {
    scale,
    west: upperLeft.lng,
    north: upperLeft.lat,
    east: upperLeft.lng + size.x / scale,
    south: upperLeft.lat - size.y / scale,
  };
}

function viewOf(window: SheetWindow, size: Point, before: SheetView | null): SheetView {
  const marginEast = (window.east - window.west) / 2;
  const marginNorth = (window.north - window.south) / 2;
  const near = {
    west: window.west - marginEast,
    east: window.east + marginEast,
    south: window.south - marginNorth,
    north: window.north + marginNorth,
  };
  const keeps =
    before !== null &&
    before.scale === window.scale &&
    Math.abs(before.anchorEast - window.west) * window.scale < 20_000 &&
    Math.abs(before.anchorNorth - window.north) * window.scale < 20_000;
  const anchor = keeps ? before : { anchorEast: window.west, anchorNorth: window.north };
  return {
    scale: window.scale,
    anchorEast: anchor.anchorEast,
    anchorNorth: anchor.anchorNorth,
    width: size.x,
    height: size.y,
    near,
  };
}

/**
 * The map of an element: made when the element is there, fitted to the bounds, fitted again when the element changes its size until
 * somebody has moved it, and when the bounds are others. The state follows once a frame, in the frame in which the tiles move.
 */
export function usePlanarMap(element: RefObject<HTMLDivElement | null>, bounds: PlaneBounds): PlanarMap | null {
  const [state, setState] = useState<PlanarMap | null>(null);
  const whole = useRef(bounds);
  const { west, south, east, north } = bounds;
  useEffect(() => {
    const container = element.current;
    if (container === null) return undefined;
    whole.current = { west, south, east, north };
    const map = createPlanarMap(container, whole.current);
    let untouched = true;
    let fitting = false;
    let frame = 0;
    const fit = () => {
      fitting = true;
      fitWhole(map, whole.current);
      fitting = false;
      untouched = true;
    };
    const update = (settled: boolean) => {
      const window = windowOf(map); // read now: when React works the update off, the map may be gone
      const size = map.getSize();
      setState((before) => ({
        map,
        window,
        view:
          settled || before?.map !== map || before.view.scale !== window.scale
            ? viewOf(window, size, before?.map === map ? before.view : null)
            : before.view,
      }));
    };
    const onMove = () => {
      if (!fitting) untouched = false;
      cancelAnimationFrame(frame);
      frame = requestAnimationFrame(() => flushSync(() => update(false)));
    };
    const onSettled = () => {
      cancelAnimationFrame(frame);
      update(true);
    };
    map.on("move", onMove);
    map.on("moveend zoomend resize", onSettled);
    container.addEventListener("sheet:whole", fit);
    const observer = new ResizeObserver(() => {
      fitting = true;
      map.invalidateSize({ animate: false, pan: false });
      fitting = false;
      if (untouched) fit();
    });
    observer.observe(container);
    fit();
    update(true);
    return () => {
      observer.disconnect();
      cancelAnimationFrame(frame);
      container.removeEventListener("sheet:whole", fit);
      map.remove();
      setState(null);
    };
  }, [element, west, south, east, north]);
  return state;
}
