import { makePlane, readPlane, type PlaneRings } from "#shared/api/area.ts";
import { readFrameCells } from "#shared/api/frame.ts";
import { EDGE_PRESETS, type CellSpec, type EdgePresetName } from "#shared/frame/cell-spec.ts";
import type { FrameCells, FrameSummary, MeasuredCells } from "#shared/frame/cells.ts";
import { unpackCells } from "#shared/frame/pack.ts";
import { previewFrame } from "#shared/frame/preview.ts";
import { selectCells } from "#shared/frame/select.ts";
import { boundsOf, ringsFromJson, vertexCount, type PlaneArea } from "#shared/geometry/rings.ts";
import { Problem } from "#shared/problem.ts";
import { call } from "../api/call.ts";

/** A study area on the plane of one projected system. */
export interface PlaneReference {
  readonly surveyId: string;
  readonly areaId: string;
  readonly epsg: number;
  /** Whether it may be made where it is not there yet; who only reads may not. */
  readonly mayMake: boolean;
}

/** What the page needs of a plane; its rings in full stay in the worker. */
export interface LoadedPlane {
  readonly crs: PlaneRings["crs"];
  readonly planeAreaM2: number;
  readonly geodesicAreaM2: number;
  readonly notes: readonly string[];
  readonly net: PlaneRings["net"];
  readonly vertices: number;
  readonly holes: number;
  /** Metres. */
  readonly bounds: { readonly west: number; readonly south: number; readonly east: number; readonly north: number };
  /** For drawing, in whole millimetres; vertices that no zoom of a whole sheet could tell apart are left out. */
  readonly outline: PlaneRings["rings"];
}

/** What each edge preset comes to, and its cells for the map: null where they are none or too many, with the reason. */
export interface FramePreviewResult {
  readonly summaries: Readonly<Record<EdgePresetName, FrameSummary>>;
  readonly cells: Readonly<Record<EdgePresetName, FrameCells | null>>;
  readonly refusals: Readonly<Record<EdgePresetName, { readonly code: string; readonly detail: string } | null>>;
}

const KEPT_PLANES = 4;
/** Vertices up to this many are drawn as they are. */
const DRAWN_VERTICES = 20_000;

/** The outline thinned for drawing: a vertex nearer to the last one kept than a 20 000th of the area's extent adds nothing. */
function drawnOutline(rings: PlaneRings["rings"], vertices: number, extentMm: number): PlaneRings["rings"] {
  if (vertices <= DRAWN_VERTICES) return rings;
  const near = extentMm / 20_000;
  return rings.map((polygon) =>
    polygon.map((ring) => {
      let [lastX, lastY] = [Infinity, Infinity];
      const kept = ring.filter(([x, y]) => {
        if (Math.abs(x - lastX) < near && Math.abs(y - lastY) < near) return false;
        [lastX, lastY] = [x, y];
        return true;
      });
      return kept.length < 3 ? ring.slice(0, 3) : kept;
    }),
  );
}

function cellsOf(measured: MeasuredCells, name: EdgePresetName) {
  try {
    return { cells: selectCells(measured, EDGE_PRESETS[name].membership, []), refusal: null };
  } catch (error) {
    if (!(error instanceof Problem)) throw error;
    return { cells: null, refusal: { code: error.code, detail: error.message } };
  }
}

/** All three presets of one spec over one area. */
function previewOf(area: PlaneArea, spec: CellSpec): FramePreviewResult {
  const { presets, measured } = previewFrame(area, spec);
  const clip = cellsOf(measured, "clip");
  const centre = cellsOf(measured, "centre");
  const inside = cellsOf(measured, "inside");
  return {
    summaries: presets,
    cells: { clip: clip.cells, centre: centre.cells, inside: inside.cells },
    refusals: { clip: clip.refusal, centre: centre.refusal, inside: inside.refusal },
  };
}

/** Lets messages that have come meanwhile be heard. */
function breath(): Promise<void> {
  return new Promise((resolve) => {
    setTimeout(resolve, 0);
  });
}

/** The work of the frame stage off the main thread: keeps planes, measures cells; of several requests only the newest is worked on. */
export class FramePreviewWork {
  private readonly planes = new Map<string, { area: PlaneArea; plane: LoadedPlane }>();
  private newest = 0;
  private loading: AbortController | null = null;

  async loadPlane(reference: PlaneReference): Promise<LoadedPlane> {
    this.loading?.abort();
    const controller = new AbortController();
    this.loading = controller;
    return (await this.planeOf(reference, controller.signal)).plane;
  }

  /** @throws Problem `cancelled` where a newer request came before this one was begun. */
  async preview(reference: PlaneReference, spec: CellSpec): Promise<FramePreviewResult> {
    this.newest += 1;
    const own = this.newest;
    const { area } = await this.planeOf(reference, undefined);
    await breath();
    if (own !== this.newest) throw new Problem("cancelled", "Other cells were asked for meanwhile.");
    return previewOf(area, spec);
  }

  async loadSealed(surveyId: string, frameId: string): Promise<FrameCells> {
    const packed = await call(readFrameCells, { params: { surveyId, frameId } });
    return unpackCells(new Uint8Array(await packed.arrayBuffer()));
  }

  private async planeOf(reference: PlaneReference, signal: AbortSignal | undefined) {
    const key = `${reference.surveyId}/${reference.areaId}/${reference.epsg}`;
    const held = this.planes.get(key);
    if (held !== undefined) return held;
    const { surveyId, areaId, epsg } = reference;
    const rings = reference.mayMake
      ? await call(makePlane, { params: { surveyId, areaId }, body: { epsg }, signal })
      : await call(readPlane, { params: { surveyId, areaId, epsg: String(epsg) }, signal });
    const loaded = loadedPlane(rings);
    this.planes.set(key, loaded);
    for (const old of [...this.planes.keys()].slice(0, -KEPT_PLANES)) this.planes.delete(old);
    return loaded;
  }
}

function loadedPlane(rings: PlaneRings): { area: PlaneArea; plane: LoadedPlane } {
  const area = ringsFromJson(rings.rings);
  const { minX, minY, maxX, maxY } = boundsOf(area);
  const vertices = vertexCount(area);
  const plane: LoadedPlane = {
    crs: rings.crs,
    planeAreaM2: rings.planeAreaM2,
    geodesicAreaM2: rings.geodesicAreaM2,
    notes: rings.notes,
    net: rings.net,
    vertices,
    holes: area.polygons.reduce((sum, polygon) => sum + polygon.length - 1, 0),
    bounds: { west: minX / 1000, south: minY / 1000, east: maxX / 1000, north: maxY / 1000 },
    outline: drawnOutline(rings.rings, vertices, Math.max(maxX - minX, maxY - minY)),
  };
  return { area, plane };
}
