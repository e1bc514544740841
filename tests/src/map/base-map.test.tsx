import { fireEvent, render, screen } from "@testing-library/react";
import { beforeEach, expect, test, vi } from "vitest";
import { BaseMapContext, type BaseMap } from "../../../src/map/base-map-context.ts";
import { addressOfTile, baseMapTiles, squareTo } from "../../../src/map/base-map.ts";
import { SheetMap } from "../../../src/map/SheetMap.tsx";
import type { SheetView } from "../../../src/map/sheet-context.ts";

const MAP: BaseMap = { url: "https://tiles.example.org/{z}/{x}/{y}.png", attribution: "Example Survey, 2030" };
/** A plane in which 100 000 m are a degree, from 2° E 51° N. */
const lngLatOf = (east: number, north: number) => ({ lng: 2 + east / 100_000, lat: 51 + north / 100_000 });

beforeEach(() => {
  vi.spyOn(HTMLCanvasElement.prototype, "getContext").mockReturnValue(null);
});

function sheet(baseMap: BaseMap | null) {
  return render(
    <BaseMapContext value={baseMap}>
      <SheetMap
        label="Study area"
        bounds={{ west: 0, south: 0, east: 200, north: 100 }}
        crsName="ETRS89 / UTM zone 31N"
        lngLatOf={lngLatOf}
        height={500}
      />
    </BaseMapContext>,
  );
}

test("without a base map nothing is fetched and nobody is named", () => {
  const fetched = vi.fn();
  vi.stubGlobal("fetch", fetched);
  const { container } = sheet(null);
  expect(container.querySelectorAll("img, image, [style*='url']")).toHaveLength(0);
  expect(screen.queryByText(/Base map/)).toBeNull();
  expect(fetched).not.toHaveBeenCalled();
  vi.unstubAllGlobals();
});

test("a base map's pictures lie below the sheet, and whom it names stands in the margin", () => {
  const { container } = sheet(MAP);
  const pictures = [...container.querySelectorAll<HTMLImageElement>(".q-base-map > img")];
  expect(pictures.length).toBeGreaterThan(3);
  expect(pictures.every((picture) => picture.src.startsWith("https://tiles.example.org/19/"))).toBe(true);
  expect(container.querySelector(".q-sheet-inner")?.firstElementChild?.className).toBe("q-base-map");
  screen.getByText("Base map: Example Survey, 2030");
});

test("a picture that does not come is paper, and the map is marked as one with holes, which is not printed", () => {
  const { container } = sheet(MAP);
  const before = container.querySelectorAll(".q-base-map > img").length;
  expect(container.querySelector("[data-incomplete]")).toBeNull();
  const [first] = container.querySelectorAll(".q-base-map > img");
  if (first === undefined) throw new Error("no picture");
  fireEvent.error(first);
  expect(container.querySelectorAll(".q-base-map > img")).toHaveLength(before - 1);
  expect(container.querySelector(".q-base-map")?.hasAttribute("data-incomplete")).toBe(true);
});

// At 0° E 0° N four pictures of zoom 1 meet: (0,0) (1,0) (0,1) (1,1). With 1 px a metre at zoom 17 (156 543/2^17 = 1.19 m a px;
// log2 156 543 = 17.26) the place is the corner of column and row 2^16 = 65 536; one picture is 360°/2^17 = 0.002747° wide, which
// is 274.7 m, and so 274.7 px, in a plane of 100 000 m a degree.
test("pictures meet where Web Mercator has them meet", () => {
  const view: SheetView = {
    scale: 1,
    anchorEast: -50,
    anchorNorth: 50,
    width: 100,
    height: 100,
    near: { west: -50, south: -50, east: 50, north: 50 },
  };
  const tiles = baseMapTiles(MAP.url, view, (east, north) => ({ lng: east / 100_000, lat: north / 100_000 }));
  expect(tiles.map((tile) => tile.key)).toEqual([
    "17/65535/65535",
    "17/65536/65535",
    "17/65535/65536",
    "17/65536/65536",
  ]);
  const matrix = (tiles[3]?.transform ?? "")
    .replace(/^matrix3d\(|\)$/g, "")
    .split(",")
    .map(Number);
  // Its upper left corner is the anchor's place of 0° E 0° N, (50, 50), less the 0.4 px by which pictures overlap.
  expect(matrix[12]).toBeCloseTo(49.6, 3);
  expect(matrix[13]).toBeCloseTo(49.6, 3);
  expect((matrix[0] ?? 0) * 256).toBeCloseTo(274.66 + 0.8, 1);
});

// By hand: (0,0) stays, (256,0) goes to (512,0): twice as wide; (0,256) to (0,128): half as high; a parallelogram has no perspective.
test("a square is mapped to its four corners", () => {
  const css = squareTo([
    [0, 0],
    [512, 0],
    [512, 128],
    [0, 128],
  ]);
  expect(css).toBe("matrix3d(2,0,0,0,0,0.5,0,0,0,0,1,0,0,0,0,1)");
});

test("a template's {s} is one of three servers, and {r} is empty on a plain screen", () => {
  const template = "https://{s}.example.org/{z}/{x}/{y}{r}.png";
  expect(addressOfTile(template, { x: 5, y: 2, z: 4 })).toBe("https://b.example.org/4/5/2.png");
});
