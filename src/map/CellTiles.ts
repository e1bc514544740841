import L from "leaflet";
import type { CellRows } from "#shared/frame/cells.ts";
import { flatRings, paintCells, thinnedRings, type CellColours, type FlatRing } from "./cell-paint.ts";
import type { CellGrid, PlaneRing } from "./sheet-geometry.ts";
import { createTileQueue } from "./tile-queue.ts";

export interface CellTilesContent {
  readonly cells: CellRows;
  readonly grid: CellGrid;
  /** The rings that cells are cut to, where only their inner part is counted. */
  readonly clip: readonly PlaneRing[] | null;
  readonly colours: CellColours;
}

const SIDE = 256;

/** The cells of a frame as canvas tiles, painted from rows of runs, a few ms of them an animation frame. */
export class CellTiles extends L.GridLayer {
  private content: CellTilesContent;
  private rings: readonly FlatRing[] | null;
  /** The rings as they are needed at one scale. */
  private thinned: { readonly scale: number; readonly rings: readonly FlatRing[] } | null = null;
  private readonly queue = createTileQueue();
  private readonly gone = new WeakSet<HTMLElement>();

  constructor(content: CellTilesContent) {
    super({
      tileSize: SIDE,
      updateWhenZooming: false,
      updateWhenIdle: false,
      keepBuffer: 1,
      noWrap: true,
      className: "q-cell-tiles",
      minZoom: -20,
      maxZoom: 12,
    });
    this.content = content;
    this.rings = content.clip === null ? null : flatRings(content.clip);
    this.on("tileunload", (event: L.TileEvent) => this.gone.add(event.tile));
  }

  /** Other cells, grid, cut or colours: all tiles are painted anew. */
  show(content: CellTilesContent): void {
    if (content.clip !== this.content.clip) {
      this.rings = content.clip === null ? null : flatRings(content.clip);
      this.thinned = null;
    }
    this.content = content;
    this.queue.clear();
    this.redraw();
  }

  /** Tiles are made for the exact zoom, whatever fraction it is: Leaflet would round it and stretch the picture. */
  protected _clampZoom(): number {
    return this._map.getZoom();
  }

  protected override createTile(coords: L.Coords, done: L.DoneCallback): HTMLElement {
    const canvas = document.createElement("canvas");
    const ratio = globalThis.devicePixelRatio || 1;
    canvas.width = SIDE * ratio;
    canvas.height = SIDE * ratio;
    const corner = this._map.unproject(L.point(coords.x * SIDE, coords.y * SIDE), coords.z);
    const place = { west: corner.lng, north: corner.lat, scale: 2 ** coords.z, size: SIDE };
    this.queue.add({
      wanted: () => !this.gone.has(canvas),
      run: () => {
        const pen = canvas.getContext("2d");
        if (pen !== null) {
          pen.scale(ratio, ratio);
          paintCells(pen, this.content.cells, this.content.grid, place, this.content.colours, this.cutAt(place.scale));
        }
        done(undefined, canvas);
      },
    });
    return canvas;
  }

  private cutAt(scale: number): readonly FlatRing[] | null {
    if (this.rings === null) return null;
    if (this.thinned?.scale !== scale) this.thinned = { scale, rings: thinnedRings(this.rings, scale) };
    return this.thinned.rings;
  }
}
