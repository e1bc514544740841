import { screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { readSession } from "#shared/api/accounts.ts";
import { importArea, listAreas, searchCrs, type AreaVersion } from "#shared/api/area.ts";
import { readSurvey } from "#shared/api/surveys.ts";
import { askAxes, askCrs, askLayer, askLines, askPlace } from "#shared/area/questions.ts";
import { Problem } from "#shared/problem.ts";
import type { Role } from "#shared/access/table.ts";
import { FakeApi } from "../app/fake-api.ts";
import { area, session, survey } from "../app/fixtures.ts";
import { renderApp } from "../app/render-app.tsx";

vi.mock("../../../src/features/area/AreaSheet.tsx", () => ({
  AreaSheet: ({ area: { number } }: { area: AreaVersion }) => <p>sheet of version {number}</p>,
}));

afterEach(() => {
  vi.unstubAllGlobals();
});

const file = new File(['{"type":"Polygon"}'], "fen.geojson");

function open(roles: Role[], areas: AreaVersion[]) {
  return new FakeApi()
    .on(readSession, () => session())
    .on(readSurvey, () => survey(roles))
    .on(listAreas, () => ({ areas }));
}

async function choose(chosen: File, label = "Drop the boundary file here") {
  await userEvent.upload(await screen.findByLabelText(label, { selector: "input" }), chosen);
}

test("a file without a known system is asked about, and the answer goes out with the same file", async () => {
  const areas: AreaVersion[] = [];
  const api = open(["planner"], areas)
    .on(searchCrs, () => ({ systems: [{ epsg: 25831, name: "ETRS89 / UTM zone 31N", note: "Europe" }] }))
    .on(importArea, ({ body }) => {
      if (body.crs === undefined) throw askCrs("These look like metres, not degrees.", "metres");
      areas.push(area());
      return area();
    })
    .install();
  renderApp("/surveys/s1/area");
  await choose(file);
  await screen.findByRole("heading", { name: "Which grid and zone are these metres in?" });
  screen.getByText("fen.geojson");
  screen.getByText("These look like metres, not degrees.");
  await userEvent.type(screen.getByLabelText("EPSG code or name"), "utm zone 31");
  await userEvent.click(await screen.findByRole("button", { name: /ETRS89 \/ UTM zone 31N/ }));
  await screen.findByText("sheet of version 1");
  const [first, second] = api.named("importArea");
  expect(first?.body).toEqual({});
  expect(second?.body).toEqual({ crs: "EPSG:25831" });
  expect(second?.file?.name).toBe("fen.geojson");
  expect(await second?.file?.text()).toBe('{"type":"Polygon"}');
});

test("an archive with several layers asks for one of them, and keeps an answer given before", async () => {
  const api = open(["planner"], [])
    .on(importArea, ({ body }) => {
      if (body.layer === undefined) throw askLayer(["fen", "roads"]);
      if (body.crs === undefined) throw askCrs("The shapefile has no .prj.", "degrees");
      throw new Problem("area-none", "Found 2 lines, no area.");
    })
    .install();
  renderApp("/surveys/s1/area");
  await choose(new File(["PK"], "layers.zip"));
  await userEvent.click(await screen.findByRole("radio", { name: "roads" }));
  await userEvent.click(screen.getByRole("button", { name: "Read “roads”" }));
  await userEvent.click(await screen.findByRole("button", { name: /WGS 84/ }));
  expect((await screen.findByRole("alert")).textContent).toBe("There is no area in this file. Found 2 lines, no area.");
  expect(api.named("importArea").at(-1)?.body).toEqual({ layer: "roads", crs: "EPSG:4326" });
});

test("an answer that cannot be used is refused, and stays where it was typed", async () => {
  const api = open(["planner"], [])
    .on(importArea, ({ body }) => {
      if (body.crs === undefined) throw askCrs("These look like metres, not degrees.", "metres");
      throw new Problem("crs-unknown", "“+proj=utn” is no projection. Check the text.");
    })
    .install();
  renderApp("/surveys/s1/area");
  await choose(file);
  const text = await screen.findByLabelText("PROJ text or WKT");
  await userEvent.type(text, "+proj=utn");
  await userEvent.click(screen.getByText("Read the file in this system"));
  await screen.findByText("“+proj=utn” is no projection. Check the text.");
  screen.getByDisplayValue("+proj=utn");
  await userEvent.type(screen.getByLabelText("PROJ text or WKT"), " +zone=31");
  await userEvent.click(screen.getByText("Read the file in this system"));
  await waitFor(() => {
    expect(api.named("importArea").map(({ body }) => body)).toEqual([
      {},
      { crs: "+proj=utn" },
      { crs: "+proj=utn +zone=31" },
    ]);
  });
});

test("a refused file is refused by name with the next step, and stays chosen", async () => {
  open(["planner"], [])
    .on(importArea, () => {
      throw new Problem("file-unknown", "This is an image (PNG). Boundaries are read from GeoJSON.");
    })
    .install();
  renderApp("/surveys/s1/area");
  await choose(new File(["PNG"], "photo.geojson"));
  expect((await screen.findByRole("alert")).textContent).toBe(
    "This kind of file is not read. This is an image (PNG). Boundaries are read from GeoJSON.",
  );
  screen.getByText("photo.geojson");
  screen.getByText(/, refused$/);
  screen.getByRole("button", { name: "Choose another file" });
});

test("a lost connection offers to send the same file again", async () => {
  let lost = true;
  const areas: AreaVersion[] = [];
  open(["planner"], areas)
    .on(importArea, () => {
      if (lost) throw new Problem("unreachable", "Check the network.");
      areas.push(area());
      return area();
    })
    .install();
  renderApp("/surveys/s1/area");
  await choose(file);
  const again = await screen.findByRole("button", { name: "Send it again" });
  lost = false;
  await userEvent.click(again);
  await screen.findByText("sheet of version 1");
});

test("swapped coordinates show both places", async () => {
  const api = open(["planner"], [])
    .on(importArea, () => {
      throw askAxes("Latitude 112 is no latitude.", null, { lng: -2.5, lat: 51.56 });
    })
    .install();
  renderApp("/surveys/s1/area");
  await choose(file);
  await screen.findByRole("heading", { name: "Are longitude and latitude exchanged?" });
  screen.getByText("no place on the Earth");
  screen.getByText("51.560000° N, 2.500000° W");
  await userEvent.click(screen.getByRole("button", { name: "Yes, it lies at the second place" }));
  await waitFor(() => {
    expect(api.named("importArea").at(-1)?.body).toEqual({ axes: "exchanged" });
  });
});

test("a file of lines asks which to close, and says how far their ends lie apart", async () => {
  const api = open(["planner"], [])
    .on(importArea, ({ body }) => {
      if (body.lines !== undefined) throw new Problem("rings-cross", "The boundary crosses itself. Move the corners.");
      throw askLines([
        { name: "walk round the fen", vertices: 214, gap: "its ends lie 12 m apart" },
        { name: "way home", vertices: 9, gap: "its ends lie 4100 m apart" },
      ]);
    })
    .install();
  renderApp("/surveys/s1/area");
  await choose(new File(["<gpx>"], "walk.gpx"));
  await screen.findByText("214 vertices; its ends lie 12 m apart.");
  expect(screen.getByRole<HTMLButtonElement>("button", { name: "Choose a line first" }).disabled).toBe(true);
  await userEvent.click(screen.getByRole("checkbox", { name: "walk round the fen" }));
  await userEvent.click(screen.getByRole("button", { name: "Close 1 line" }));
  await screen.findByText("The boundary crosses itself. Move the corners.", { exact: false });
  expect(api.named("importArea").at(-1)?.body).toEqual({ lines: [0] });
});

test("a boundary that crosses itself names the place", async () => {
  open(["planner"], [])
    .on(importArea, () => {
      throw askPlace("rings-cross", "The boundary crosses itself. Move the corners apart.", {
        lng: 14.255,
        lat: 51.554,
      });
    })
    .install();
  renderApp("/surveys/s1/area");
  await choose(file);
  await screen.findByText("The boundary crosses itself. Move the corners apart.");
  screen.getByText("51.554000° N, 14.255000° E");
  screen.getByText(/, refused$/);
});

test("the report tells what was found, how the system was known and what was left aside", async () => {
  open(["planner"], [area()]).install();
  renderApp("/surveys/s1/area");
  await screen.findByText("1 polygon, 4 vertices.");
  screen.getByText(/GeoJSON is in WGS 84 \(RFC 7946\)\./);
  screen.getByText("3 features without a shape were passed over.");
  screen.getByText("Nothing had to be mended.");
  expect(screen.getByRole("link", { name: "Original file" }).getAttribute("href")).toBe(
    "/api/surveys/s1/areas/ar1/file",
  );
  expect(screen.getByRole("link", { name: /Lay cells over/ }).getAttribute("href")).toBe("/surveys/s1/frame");
});

test.each([["lead"], ["auditor"]] as const)("the %s reads the report and has nothing to press", async (role) => {
  open([role], [area()]).install();
  renderApp("/surveys/s1/area");
  await screen.findByText("1 polygon, 4 vertices.");
  expect(screen.queryByRole("button", { name: "Replace…" })).toBeNull();
  expect(screen.queryByRole("link", { name: /Lay cells over/ })).toBeNull();
  expect(document.querySelector('input[type="file"]')).toBeNull();
});

test("without a boundary the auditor is told who imports it", async () => {
  open(["auditor"], []).install();
  renderApp("/surveys/s1/area");
  await screen.findByText("There is no study area yet. A planner of the survey imports it.");
});

test("an earlier version can be shown again", async () => {
  open(["planner"], [area({ id: "ar2", number: 2 }), area()]).install();
  renderApp("/surveys/s1/area");
  await screen.findByText("sheet of version 2");
  await userEvent.click(screen.getByRole("button", { name: "Show" }));
  await screen.findByText("sheet of version 1");
  screen.getByText("version 1, not the newest");
});

test("another boundary can be begun and left without losing the one that is there", async () => {
  open(["planner"], [area()]).install();
  renderApp("/surveys/s1/area");
  await userEvent.click(await screen.findByRole("button", { name: "Replace…" }));
  await userEvent.click(screen.getByRole("button", { name: "Keep the boundary that is there" }));
  await waitFor(() => {
    screen.getByText("1 polygon, 4 vertices.");
  });
});
