import { act, render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { beforeEach, describe, expect, it, vi } from "vitest";
import { AreaOutline } from "../../../src/map/AreaOutline.tsx";
import { CountsLayer, type SheetCount } from "../../../src/map/CountsLayer.tsx";
import { FrameCellsLayer } from "../../../src/map/FrameCellsLayer.tsx";
import { PicksLayer, type SheetPick } from "../../../src/map/PicksLayer.tsx";
import { SheetMap } from "../../../src/map/SheetMap.tsx";
import type { PlanePolygons } from "../../../src/map/sheet-geometry.ts";

const GRID = { widthMm: 20_000, heightMm: 20_000, originEastMm: 0, originNorthMm: 0 };
const AREA: PlanePolygons = [
  [
    [
      [0, 0],
      [200_000, 0],
      [200_000, 100_000],
      [0, 100_000],
    ],
    [
      [60_000, 40_000],
      [60_000, 60_000],
      [80_000, 60_000],
      [80_000, 40_000],
    ],
  ],
];
const BOUNDS = { west: 0, south: 0, east: 200, north: 100 };

const PICKS: readonly SheetPick[] = [
  { key: "u7", column: 1, row: 1, label: "B4", order: 1, times: 1, reserve: false },
  { key: "u3", column: 8, row: 3, label: "I2", order: 2, times: 2, reserve: false },
  { key: "u9", column: 5, row: 0, label: "F5", order: 4, times: 1, reserve: true },
];

// jsdom has no canvas: cells are painted by functions that have tests of their own.
beforeEach(() => {
  vi.spyOn(HTMLCanvasElement.prototype, "getContext").mockReturnValue(null);
});

function Drawn() {
  const [chosen, setChosen] = useState<string | null>(null);
  return (
    <>
      <output>{chosen ?? "none"}</output>
      <SheetMap label="Drawn cells" bounds={BOUNDS} crsName="ETRS89 / UTM zone 31N" height={500}>
        <AreaOutline polygons={AREA} />
        <PicksLayer picks={PICKS} spec={GRID} clip={AREA} chosen={chosen} onChoose={setChosen} />
      </SheetMap>
    </>
  );
}

/** A press on the map at a place in px of its box (800 × 560 in these tests). */
function pressAt(x: number, y: number) {
  const map = document.querySelector(".q-sheet-map");
  if (map === null) throw new RangeError("no map");
  for (const type of ["mousedown", "mouseup", "click"]) {
    act(() => {
      map.dispatchEvent(new MouseEvent(type, { bubbles: true, clientX: x, clientY: y, detail: 1 }));
    });
  }
}

describe("the sheet", () => {
  it("is a figure with a name, three buttons, a scale bar and north", () => {
    render(<SheetMap label="Study area" bounds={BOUNDS} crsName="ETRS89 / UTM zone 31N" height={500} />);
    expect(screen.getByRole("figure", { name: "Study area" })).toBeTruthy();
    expect(screen.getAllByRole("button").map((button) => button.getAttribute("aria-label"))).toEqual([
      "Zoom in",
      "Zoom out",
      "Whole area",
    ]);
    // 560 px less twice 26 for 100 m, 800 px less 52 for 200 m: 3.74 px a metre. At most 200 px are 50 m; a ninth of 800 px is 23.8 m, so lines are 50 m apart.
    expect(screen.getByRole("img", { name: "Scale bar of 50\u00a0m" })).toBeTruthy();
    expect(screen.getByRole("img", { name: "North is up" })).toBeTruthy();
    expect(screen.getByText("ETRS89 / UTM zone 31N, lines every 50 m")).toBeTruthy();
  });

  it("zooms by button and comes back to the whole area", async () => {
    render(<SheetMap label="Study area" bounds={BOUNDS} crsName="x" height={500} />);
    await userEvent.click(screen.getByRole("button", { name: "Zoom in" }));
    await waitFor(() => expect(screen.getByRole("img", { name: "Scale bar of 20\u00a0m" })).toBeTruthy());
    await userEvent.click(screen.getByRole("button", { name: "Whole area" }));
    await waitFor(() => expect(screen.getByRole("img", { name: "Scale bar of 50\u00a0m" })).toBeTruthy());
  });

  it("prints the graticule alone where there is no CRS yet", () => {
    const { container } = render(
      <SheetMap
        label="Study area"
        bounds={BOUNDS}
        crsName={null}
        lngLatOf={(east, north) => ({ lng: 2 + east / 70_000, lat: 51 + north / 111_000 })}
        height={500}
      />,
    );
    expect(screen.getByText("Longitude and latitude, WGS 84")).toBeTruthy();
    expect(container.querySelectorAll(".q-sheet-figures text")).toHaveLength(0);
    expect(container.querySelectorAll(".q-sheet-angles text").length).toBeGreaterThan(4);
  });

  it("goes away with all that it held", () => {
    const { unmount, container } = render(<Drawn />);
    unmount();
    expect(container.innerHTML).toBe("");
  });
});

describe("drawn cells on the sheet", () => {
  it("a cell is outlined once however often it was picked; the badge says how often", () => {
    const { container } = render(<Drawn />);
    const outlines = [...container.querySelectorAll<SVGPathElement>('g[data-slot="drawn"] > path')].map((path) => [
      path.getAttribute("stroke"),
      path.getAttribute("d")?.match(/M/g)?.length,
    ]);
    expect(outlines).toEqual([
      ["var(--map-reserve)", 1],
      [null, 2],
      ["var(--map-drawn)", 2],
    ]);
    const figures = [...container.querySelectorAll('g[data-slot="figures"] text')].map((text) => text.textContent);
    expect(figures).toEqual(["1", "2", "×2"]);
  });

  it("the tint of a drawn cell stops at the boundary, its outline does not", () => {
    const { container } = render(<Drawn />);
    const [, tint, outline] = container.querySelectorAll('g[data-slot="drawn"] > path');
    expect(tint?.getAttribute("clip-path")).toMatch(/^url\(#/);
    expect(outline?.getAttribute("clip-path")).toBeNull();
  });

  it("one stop of the Tab key holds all of them: arrows go in draw order, Enter chooses", async () => {
    render(<Drawn />);
    const stop = () => screen.getByRole("button", { name: /Arrows/ });
    expect(stop().getAttribute("aria-label")).toContain("Cell B4, pick 1");
    stop().focus();
    await userEvent.keyboard("{ArrowRight}");
    expect(stop().getAttribute("aria-label")).toContain("Cell I2, pick 2, picked 2 times");
    await userEvent.keyboard("{Enter}");
    expect(screen.getByRole("status").textContent).toBe("u3");
    await userEvent.keyboard("{End}");
    expect(stop().getAttribute("aria-label")).toContain("Cell F5, reserve 4");
  });

  // 3.74 px a metre around the middle (100 m, 50 m) at (400, 280): cell (8, 3) has its middle at (170 m, 70 m).
  it("a press chooses the cell that it meets, and none beside the cells", async () => {
    render(<Drawn />);
    pressAt(400 - 40 * 3.74, 280);
    expect(screen.getByRole("status").textContent).toBe("none");
    pressAt(400 + 70 * 3.74, 280 - 20 * 3.74);
    await waitFor(() => expect(screen.getByRole("status").textContent).toBe("u3"));
  });
});

describe("counts on the sheet", () => {
  it("a cell that was not counted never has a step of the ramp, and zero has a ring", () => {
    const counts: readonly SheetCount[] = [
      { key: "a", column: 1, row: 1, label: "B4", state: "counted", value: 0 },
      { key: "b", column: 2, row: 1, label: "C4", state: "counted", value: 7 },
      { key: "c", column: 3, row: 1, label: "D4", state: "not-counted", word: "refused" },
      { key: "d", column: 4, row: 1, label: "E4", state: "not-visited" },
    ];
    const { container } = render(
      <SheetMap label="Counts" bounds={BOUNDS} crsName="x" height={500}>
        <CountsLayer counts={counts} spec={GRID} chosen="c" onChoose={() => undefined} />
      </SheetMap>,
    );
    const fills = [...container.querySelectorAll('g[data-slot="fill"] > path')].map((path) => [
      path.getAttribute("fill"),
      path.getAttribute("d")?.match(/M/g)?.length ?? 0,
    ]);
    expect(fills).toEqual([
      ["var(--color-count-0)", 1],
      ["var(--color-count-1)", 0],
      ["var(--color-count-2)", 0],
      ["var(--color-count-3)", 1],
      ["var(--color-count-4)", 0],
      ["var(--color-count-5)", 0],
      ["var(--color-paper)", 1],
    ]);
    expect(container.querySelectorAll('g[data-slot="figures"] circle')).toHaveLength(1);
    expect([...container.querySelectorAll(".q-callout text")].map((text) => text.textContent)).toEqual([
      "D4",
      "refused",
    ]);
  });
});

describe("cells of a frame on the sheet", () => {
  it("a press tells the cell that holds the place", () => {
    const choose = vi.fn();
    const cells = {
      leftColumn: 0,
      topRow: 4,
      columns: 10,
      rows: 1,
      rowStart: Int32Array.of(0, 1),
      first: Int32Array.of(0),
      last: Int32Array.of(9),
      share: Int32Array.of(1_000_000_000),
    };
    render(
      <SheetMap label="Frame" bounds={BOUNDS} crsName="x" height={500}>
        <FrameCellsLayer cells={cells} spec={GRID} onChoose={choose} />
      </SheetMap>,
    );
    expect(document.querySelectorAll(".q-cell-tiles canvas").length).toBeGreaterThan(3);
    pressAt(400 + 70 * 3.74, 280 - 20 * 3.74);
    expect(choose).toHaveBeenCalledWith(8, 3);
  });
});
