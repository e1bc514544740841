import type { EpsgEntry } from "#shared/projection/crs.ts";

const ZERO_SHIFT = "+towgs84=0,0,0,0,0,0,0";
const world = [-180, -90, 180, 90] as const;

/** PROJ texts as in the EPSG list, of systems that are known everywhere, also in browsers without the list. */
const FIXED: readonly EpsgEntry[] = [
  { code: 4326, name: "WGS 84", proj4: "+proj=longlat +datum=WGS84 +no_defs", kind: "geographic", bounds: world },
  {
    code: 4258,
    name: "ETRS89",
    proj4: `+proj=longlat +ellps=GRS80 ${ZERO_SHIFT} +no_defs`,
    kind: "geographic",
    bounds: [-16.1, 32.88, 40.18, 84.73],
  },
  {
    code: 4269,
    name: "NAD83",
    proj4: `+proj=longlat +ellps=GRS80 ${ZERO_SHIFT} +no_defs`,
    kind: "geographic",
    bounds: [-180, 14.92, 180, 86.45],
  },
  {
    code: 3857,
    name: "WGS 84 / Pseudo-Mercator",
    proj4:
      "+proj=merc +a=6378137 +b=6378137 +lat_ts=0 +lon_0=0 +x_0=0 +y_0=0 +k=1 +units=m +nadgrids=@null +wktext +no_defs",
    kind: "projected",
    bounds: [-180, -85.06, 180, 85.06],
  },
  {
    code: 3035,
    name: "ETRS89-extended / LAEA Europe",
    proj4: `+proj=laea +lat_0=52 +lon_0=10 +x_0=4321000 +y_0=3210000 +ellps=GRS80 ${ZERO_SHIFT} +units=m +no_defs`,
    kind: "projected",
    bounds: [-35.58, 24.6, 44.83, 84.73],
  },
  {
    code: 5070,
    name: "NAD83 / Conus Albers",
    proj4: `+proj=aea +lat_0=23 +lon_0=-96 +lat_1=29.5 +lat_2=45.5 +x_0=0 +y_0=0 +ellps=GRS80 ${ZERO_SHIFT} +units=m +no_defs`,
    kind: "projected",
    bounds: [-124.79, 24.41, -66.91, 49.38],
  },
  {
    code: 3577,
    name: "GDA94 / Australian Albers",
    proj4: `+proj=aea +lat_0=0 +lon_0=132 +lat_1=-18 +lat_2=-36 +x_0=0 +y_0=0 +ellps=GRS80 ${ZERO_SHIFT} +units=m +no_defs`,
    kind: "projected",
    bounds: [112.85, -43.7, 153.69, -9.86],
  },
  // The list gives the national grid shift file, which is not shipped; the seven parameters published beside it are good to about 5 m.
  {
    code: 27700,
    name: "OSGB36 / British National Grid",
    proj4:
      "+proj=tmerc +lat_0=49 +lon_0=-2 +k=0.9996012717 +x_0=400000 +y_0=-100000 +ellps=airy +towgs84=446.448,-125.157,542.06,0.15,0.247,0.842,-20.489 +units=m +no_defs",
    kind: "projected",
    bounds: [-9, 49.75, 2.01, 61.01],
  },
  {
    code: 4277,
    name: "OSGB36",
    proj4: "+proj=longlat +ellps=airy +towgs84=446.448,-125.157,542.06,0.15,0.247,0.842,-20.489 +no_defs",
    kind: "geographic",
    bounds: [-9, 49.75, 2.01, 61.01],
  },
];

const fixedByCode = new Map(FIXED.map((entry) => [entry.code, entry]));

/** A system that needs no list: WGS 84, ETRS89 and NAD83 with their UTM zones, and a few that are met everywhere. */
export function builtInSystem(code: number): EpsgEntry | undefined {
  return fixedByCode.get(code) ?? utmSystem(code);
}

/** 326zz and 327zz are WGS 84 / UTM north and south, 258zz ETRS89 / UTM (zones 28 to 38), 269zz NAD83 / UTM (zones 1 to 23). */
function utmSystem(code: number): EpsgEntry | undefined {
  const family = Math.floor(code / 100);
  const zone = code % 100;
  if ((family === 326 || family === 327) && zone >= 1 && zone <= 60) {
    const south = family === 327;
    const datum = `+proj=utm +zone=${zone} ${south ? "+south " : ""}+datum=WGS84 +units=m +no_defs`;
    return utmEntry(code, `WGS 84 / UTM zone ${zone}${south ? "S" : "N"}`, datum, zone, south ? [-80, 0] : [0, 84]);
  }
  if (family === 258 && zone >= 28 && zone <= 38) {
    return utmEntry(
      code,
      `ETRS89 / UTM zone ${zone}N`,
      `+proj=utm +zone=${zone} +ellps=GRS80 ${ZERO_SHIFT} +units=m +no_defs`,
      zone,
      [34, 84],
    );
  }
  if (family === 269 && zone >= 1 && zone <= 23) {
    return utmEntry(
      code,
      `NAD83 / UTM zone ${zone}N`,
      `+proj=utm +zone=${zone} +ellps=GRS80 ${ZERO_SHIFT} +units=m +no_defs`,
      zone,
      [14, 84],
    );
  }
  return undefined;
}

function utmEntry(
  code: number,
  name: string,
  proj4: string,
  zone: number,
  [south, north]: readonly [number, number],
): EpsgEntry {
  const west = zone * 6 - 186;
  return { code, name, proj4, kind: "projected", bounds: [west, south, west + 6, north] };
}
