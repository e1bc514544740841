import L from "leaflet";
import type { PlaneBounds } from "./sheet-geometry.ts";

/** Zoom 0 is one px a metre; each step doubles. */
const FARTHEST = -14;
const NEAREST = 7;

/** A plane of metres, east to the right and north up, drawn around a middle so that pixel numbers stay small. */
function planarCrs(middle: { east: number; north: number }): L.CRS {
  return L.Util.extend({}, L.CRS.Simple, { transformation: new L.Transformation(1, -middle.east, -1, middle.north) });
}

/** Metres as Leaflet's pair: latitude is north, longitude is east. */
export function place(east: number, north: number): L.LatLng {
  return L.latLng(north, east);
}

/** A map without tiles, controls or animation in an element; it pans, zooms to any scale, and works by key and touch. */
export function createPlanarMap(element: HTMLElement, bounds: PlaneBounds): L.Map {
  const map = L.map(element, {
    crs: planarCrs({
      east: Math.round((bounds.west + bounds.east) / 2),
      north: Math.round((bounds.south + bounds.north) / 2),
    }),
    attributionControl: false,
    // The sheet follows its own element's size; a second watcher would count as somebody moving the map.
    trackResize: false,
    zoomControl: false,
    zoomAnimation: false,
    fadeAnimation: false,
    markerZoomAnimation: false,
    inertia: false,
    zoomSnap: 0,
    zoomDelta: 0.5,
    wheelPxPerZoomLevel: 160,
    minZoom: FARTHEST,
    maxZoom: NEAREST,
    boxZoom: true,
    doubleClickZoom: true,
  });
  map.setView(place((bounds.west + bounds.east) / 2, (bounds.south + bounds.north) / 2), 0);
  return map;
}

/** px a metre so that the bounds fill the size but for a margin. */
export function fittingScale(bounds: PlaneBounds, width: number, height: number, margin: number): number {
  const across = Math.max(bounds.east - bounds.west, 0.001);
  const up = Math.max(bounds.north - bounds.south, 0.001);
  return Math.max(0.0001, Math.min(Math.max(1, width - 2 * margin) / across, Math.max(1, height - 2 * margin) / up));
}

/** Shows the whole of the bounds. */
export function fitWhole(map: L.Map, bounds: PlaneBounds): void {
  const size = map.getSize();
  const margin = Math.min(26, 0.05 * Math.min(size.x, size.y));
  const zoom = Math.min(NEAREST, Math.max(FARTHEST, Math.log2(fittingScale(bounds, size.x, size.y, margin))));
  map.setView(place((bounds.west + bounds.east) / 2, (bounds.south + bounds.north) / 2), zoom, { animate: false });
}
