import { describe, expect, test } from "vitest";
import { crsFromEpsg } from "#shared/projection/crs.ts";
import { areaScaleAt, distortionInWords } from "#shared/projection/distortion.ts";
import { suggestFrameCrs } from "#shared/projection/suggest.ts";
import { utmFor, utmZone } from "#shared/projection/utm.ts";

describe("the UTM zone of a place", () => {
  // The zones of points.json and, for the exceptions, the zones' definition (zone 32 in south-west Norway; Svalbard).
  test.each([
    ["Suva", 178.44, -18.14, 32760],
    ["Hobart", 147.33, -42.88, 32755],
    ["Stanley", -57.85, -51.7, 32721],
    ["Dare", -75.78, 36.2, 32618],
    ["Bergen", 5.32, 60.39, 32632],
    ["Longyearbyen", 15.6, 78.2, 32633],
    ["Hopen, Svalbard", 25.0, 76.5, 32635],
    ["on the equator", 9.1, 0, 32632],
    ["on a zone's western edge", 12, 50, 32633],
    ["at 180°", 180, 10, 32660],
  ])("%s", (_, lng, lat, epsg) => {
    expect(utmFor({ lng, lat }).epsg).toBe(epsg);
  });

  test("is between 1 and 60 everywhere", () => {
    for (let lng = -180; lng <= 180; lng += 0.5)
      expect(utmZone({ lng, lat: -10 })).toBe(Math.min(60, Math.floor((lng + 180) / 6) + 1));
  });
});

describe("distortion of areas", () => {
  // In the middle of a UTM zone the scale of lengths is 0.9996, so that of areas is 0.9996² = 0.99920016.
  test("in the middle of a UTM zone is 0.9996²", () => {
    expect(areaScaleAt(crsFromEpsg(32633), { lng: 15, lat: 52 })).toBeCloseTo(0.9996 ** 2, 6);
  });

  // An equal-area projection has scale 1 everywhere by definition.
  test.each([3035, 5070])("EPSG:%d keeps areas", (epsg) => {
    for (const place of epsg === 3035
      ? [
          { lng: 5, lat: 50 },
          { lng: 28, lat: 70 },
        ]
      : [
          { lng: -96, lat: 23 },
          { lng: -122, lat: 47 },
        ]) {
      expect(areaScaleAt(crsFromEpsg(epsg), place)).toBeCloseTo(1, 6);
    }
  });

  // Web Mercator (EPSG:3857) at 60°: lengths 1/cos 60° = 2 on its sphere, areas about 4 (3.99 on the ellipsoid).
  test("of Web Mercator at 60° is about fourfold", () => {
    expect(areaScaleAt(crsFromEpsg(3857), { lng: 10, lat: 60 })).toBeCloseTo(4, 1);
  });

  test("is told in a sentence", () => {
    expect(distortionInWords(0.9993)).toBe("areas come out 0.07 % small");
    expect(distortionInWords(1.00005)).toBe("areas come out 0.005 % large");
    expect(distortionInWords(1.0000001)).toBe("areas come out true");
    expect(distortionInWords(4)).toBe("areas come out 300 % large");
  });
});

describe("systems suggested for a frame", () => {
  test("are the UTM zone of the middle, ETRS89 beside WGS 84 in Europe", () => {
    const suggested = suggestFrameCrs([14.25, 51.55, 14.26, 51.558]);
    expect(suggested.map(({ epsg }) => epsg)).toEqual([32633, 25833]);
    expect(suggested[0]?.note).toMatch(/^areas come out 0\.0\d+ % small here$/);
  });

  test("say when the area spans zones", () => {
    const [first] = suggestFrameCrs([11.9, 51, 12.3, 51.2]);
    expect(first).toMatchObject({ epsg: 32633 });
    expect(first?.note).toContain("spans the zones 32 to 33");
  });

  test("put the equal-area system of the continent first for a wide area", () => {
    const [first, second] = suggestFrameCrs([5, 46, 15, 55]);
    expect(first).toMatchObject({ epsg: 3035, note: "areas come out true here; equal-area" });
    expect(second?.epsg).toBe(32632);
  });

  test("know only WGS 84 / UTM outside Europe", () => {
    expect(suggestFrameCrs([147.3, -42.9, 147.4, -42.8]).map(({ epsg }) => epsg)).toEqual([32755]);
  });
});
