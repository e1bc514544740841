import { describe, expect, test } from "vitest";
import { epsgLookup } from "#server/jobs/epsg.ts";
import { checkFrameCrs, crsFromEpsg, crsFromText } from "#shared/projection/crs.ts";
import { transformer, WGS84 } from "#shared/projection/transformer.ts";
import { refusalOf } from "../../fixtures/refusal.ts";
import { points } from "./reference.ts";

const ESRI_UTM =
  'PROJCS["WGS_1984_UTM_Zone_18N",GEOGCS["GCS_WGS_1984",DATUM["D_WGS_1984",SPHEROID["WGS_1984",6378137.0,298.257223563]],PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]],PROJECTION["Transverse_Mercator"],PARAMETER["False_Easting",500000.0],PARAMETER["False_Northing",0.0],PARAMETER["Central_Meridian",-75.0],PARAMETER["Scale_Factor",0.9996],PARAMETER["Latitude_Of_Origin",0.0],UNIT["Meter",1.0]]';
const ESRI_OSGB =
  'PROJCS["British_National_Grid",GEOGCS["GCS_OSGB_1936",DATUM["D_OSGB_1936",SPHEROID["Airy_1830",6377563.396,299.3249646]],PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]],PROJECTION["Transverse_Mercator"],PARAMETER["False_Easting",400000.0],PARAMETER["False_Northing",-100000.0],PARAMETER["Central_Meridian",-2.0],PARAMETER["Scale_Factor",0.9996012717],PARAMETER["Latitude_Of_Origin",49.0],UNIT["Meter",1.0]]';
const ESRI_NAD27 =
  'GEOGCS["GCS_North_American_1927",DATUM["D_North_American_1927",SPHEROID["Clarke_1866",6378206.4,294.9786982]],PRIMEM["Greenwich",0],UNIT["Degree",0.017453292519943295]]';
const ESRI_DHDN =
  'PROJCS["DHDN_3_Degree_Gauss_Zone_3",GEOGCS["GCS_Deutsches_Hauptdreiecksnetz",DATUM["D_Deutsches_Hauptdreiecksnetz",SPHEROID["Bessel_1841",6377397.155,299.1528128]],PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]],PROJECTION["Gauss_Kruger"],PARAMETER["False_Easting",3500000.0],PARAMETER["False_Northing",0.0],PARAMETER["Central_Meridian",9.0],PARAMETER["Scale_Factor",1.0],PARAMETER["Latitude_Of_Origin",0.0],UNIT["Meter",1.0]]';

describe("conversion to projected systems", () => {
  // PROJ 9.1.1 cs2cs; the file states how far npm proj4 departs with the same text (0.75 mm at Land's End, else below 0.0001 mm).
  test.each(points)(
    "EPSG:$epsg at $name agrees with PROJ",
    ({ epsg, lon, lat, E_cs2cs, N_cs2cs, diff_npm_vs_cs2cs_samestring_mm }) => {
      const { forward, inverse } = transformer(WGS84, crsFromEpsg(epsg, epsgLookup));
      const [east, north] = forward([lon, lat]);
      expect(Math.hypot(east - E_cs2cs, north - N_cs2cs) * 1000).toBeLessThan(diff_npm_vs_cs2cs_samestring_mm + 0.001);
      const back = inverse([east, north]);
      if (Math.abs(lat) < 90) expect(Math.abs(back[0] - lon) * Math.cos((lat * Math.PI) / 180)).toBeLessThan(1e-7);
      expect(Math.abs(back[1] - lat)).toBeLessThan(1e-7);
    },
  );

  test("a system to itself leaves positions untouched", () => {
    const position = [431_220.123456789, 5_712_400] as const;
    expect(transformer(crsFromEpsg(25833), crsFromEpsg(25833)).forward(position)).toBe(position);
  });

  test("a place that a projection cannot show is refused by name", () => {
    const { forward } = transformer(WGS84, crsFromEpsg(3857));
    const { code, message } = refusalOf(() => forward([0, 90]));
    expect(code).toBe("crs-unsupported");
    expect(message).toContain("WGS 84 / Pseudo-Mercator");
  });
});

describe("the text of a system", () => {
  test.each([
    "25833",
    "EPSG:25833",
    "epsg::25833",
    "urn:ogc:def:crs:EPSG::25833",
    "urn:ogc:def:crs:EPSG:6.18:25833",
    "http://www.opengis.net/def/crs/EPSG/0/25833",
  ])("%s is ETRS89 / UTM zone 33N", (text) => {
    expect(crsFromText(text)).toMatchObject({
      epsg: 25833,
      name: "ETRS89 / UTM zone 33N",
      kind: "projected",
      metresPerUnit: 1,
    });
  });

  test.each(["urn:ogc:def:crs:OGC:1.3:CRS84", "http://www.opengis.net/def/crs/OGC/1.3/CRS84", "OGC:CRS84", "4326"])(
    "%s is longitude and latitude of WGS 84",
    (text) => {
      expect(crsFromText(text)).toMatchObject({ epsg: 4326, kind: "geographic", metresPerUnit: null });
    },
  );

  test("a .prj with a byte order mark and line breaks reads as without", () => {
    const broken = `\uFEFF${ESRI_UTM.replaceAll("],", "],\r\n  ")}\r\n`;
    const place = [-75.78317260742188, 36.22519302368164] as const;
    const [plain, marked] = [crsFromText(ESRI_UTM), crsFromText(broken)];
    expect(transformer(WGS84, marked).forward(place)).toEqual(transformer(WGS84, plain).forward(place));
    expect(marked).toMatchObject({ name: "WGS 1984 UTM Zone 18N", kind: "projected", metresPerUnit: 1 });
  });

  // points.json: EPSG:27700 by its seven parameters.
  test("an ESRI .prj of the British National Grid keeps its datum shift", () => {
    const row = points.find(({ epsg }) => epsg === 27700);
    if (row === undefined) throw new RangeError("no row for 27700");
    const crs = crsFromText(ESRI_OSGB);
    const [east, north] = transformer(WGS84, crs).forward([row.lon, row.lat]);
    expect(Math.hypot(east - row.E_cs2cs, north - row.N_cs2cs)).toBeLessThan(0.05);
    expect(crs.note).toMatch(/seven parameters/);
  });

  test("US survey feet are read with their length, as a source", () => {
    const crs = crsFromText("EPSG:2264", epsgLookup);
    expect(crs.metresPerUnit).toBeCloseTo(1200 / 3937, 12);
    // expected.json of the import files (GDAL): first vertex of crs_us_survey_feet_nc.zip.
    const [lng, lat] = transformer(crs, WGS84).forward([2948713.4663360636, 916250.3230732869]);
    expect(lng).toBeCloseTo(-75.78317260742188, 9);
    expect(lat).toBeCloseTo(36.22519302368163, 9);
  });

  test.each([
    "",
    "my own grid",
    "EPSG:1",
    "EPSG:99999",
    "PROJCS[broken",
    "+proj=nonsense +datum=WGS84",
    'LOCAL_CS["x"]',
  ])("“%s” is refused as unknown", (text) => {
    expect(refusalOf(() => crsFromText(text, epsgLookup)).code).toBe("crs-unknown");
  });
});

describe("a system that would be converted silently wrong", () => {
  test.each([
    ["NAD27 by code needs a grid file", "EPSG:4267", /NTv2_0\.gsb/],
    ["NAD27 / UTM by code needs a grid file", "EPSG:26717", /NTv2_0\.gsb/],
    ["NAD27 in a .prj would lose its shift", ESRI_NAD27, /North American 1927/],
    ["NAD27 as a PROJ datum would lose its shift", "+proj=utm +zone=17 +datum=NAD27 +units=m", /not stated|grid file/],
    ["DHDN by code needs a grid file", "EPSG:31467", /BETA2007\.gsb/],
    ["DHDN in a .prj would lose its shift", ESRI_DHDN, /DHDN 3 Degree/],
    ["any grid file that is not there", "+proj=tmerc +lon_0=9 +ellps=bessel +nadgrids=BETA2007.gsb", /BETA2007/],
    ["an old ellipsoid without a shift", "+proj=utm +zone=32 +ellps=intl +units=m", /not stated/],
    ["axes that run west and south", "EPSG:2053", /axes/],
    [
      "grads",
      'GEOGCS["NTF (Paris)",DATUM["Nouvelle_Triangulation_Francaise_Paris",SPHEROID["Clarke 1880 (IGN)",6378249.2,293.466021293627]],PRIMEM["Paris",2.33722917],UNIT["grad",0.0157079632679489]]',
      /grad/,
    ],
    ["heights only", "EPSG:5703", /neither/],
    ["a shift that does not come home", "EPSG:3058", /come home/],
  ])("%s is refused by name", (_, text, reason) => {
    const { code, message } = refusalOf(() => crsFromText(text, epsgLookup));
    expect(code).toBe("crs-unsupported");
    expect(message).toMatch(reason);
  });
});

describe("the system of a frame", () => {
  test("is projected and in metres", () => {
    expect(checkFrameCrs(crsFromEpsg(32633)).epsg).toBe(32633);
    const degrees = refusalOf(() => checkFrameCrs(WGS84));
    const feet = refusalOf(() => checkFrameCrs(crsFromEpsg(2264, epsgLookup)));
    expect([degrees.code, feet.code]).toEqual(["crs-unsupported", "crs-unsupported"]);
    expect(degrees.message).toContain("degrees");
    expect(feet.message).toContain("not in metres");
  });
});
