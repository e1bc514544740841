import { kml } from "@tmcw/togeojson";
import type { Document } from "@xmldom/xmldom";
import type { FoundPolygons } from "#shared/area/found.ts";
import { Problem } from "#shared/problem.ts";
import { readGeoJson } from "#shared/exchange/geojson.ts";
import { parseXml } from "#shared/exchange/xml.ts";

/**
 * KML (always longitude and latitude of WGS 84) to polygons as they came. Declarations of entities are refused before anything
 * is parsed. The converter from npm closes rings, drops short ones and overlooks prefixed elements without a word, so what it
 * gives is compared with the rings in the document, and what it did is told.
 * @throws Problem file-unsafe, file-damaged.
 */
export function readKml(text: string): FoundPolygons {
  const document = parseXml(text, "KML");
  if (document.documentElement?.localName !== "kml") {
    throw new Problem(
      "file-unknown",
      `This is XML, but not KML: its outermost element is “${document.documentElement?.nodeName ?? "none"}”. Export the boundary as KML, GeoJSON or a zipped shapefile.`,
    );
  }
  const audit = auditRings(document);
  if (audit.unreadable > 0) {
    throw new Problem(
      "file-damaged",
      `${audit.unreadable} vertices of polygons in this KML are not numbers. Export the boundary again; nothing is left out silently.`,
    );
  }
  const found = readGeoJson(JSON.stringify(kml(document)));
  const taken = found.polygons.reduce((sum, polygon) => sum + polygon.length, 0);
  if (taken !== audit.rings - audit.short) {
    throw new Problem(
      "file-damaged",
      `The file holds ${audit.rings} rings of polygons, but only ${taken} can be read: its elements have prefixes or stand in unusual places. Save it again as KML or GeoJSON.`,
    );
  }
  const mended =
    audit.open === 0
      ? []
      : [audit.open === 1 ? "1 ring was open; closed it." : `${audit.open} rings were open; closed them.`];
  const ignored =
    audit.short === 0
      ? []
      : [`${audit.short} ${audit.short === 1 ? "ring" : "rings"} with fewer than three corners left aside.`];
  return {
    ...found,
    format: "KML",
    crs: {
      kind: "stated",
      text: "EPSG:4326",
      howKnown: "KML is always in longitude and latitude of WGS 84",
      byFile: true,
    },
    mended,
    ignored,
    notes: [],
  };
}

/** Rings within polygons as the document has them, whatever their prefix. */
function auditRings(document: Document): { rings: number; open: number; short: number; unreadable: number } {
  const audit = { rings: 0, open: 0, short: 0, unreadable: 0 };
  for (const polygon of document.getElementsByTagNameNS("*", "Polygon")) {
    for (const ring of polygon.getElementsByTagNameNS("*", "LinearRing")) {
      const texts = [...ring.getElementsByTagNameNS("*", "coordinates")].map((element) => element.textContent ?? "");
      const vertices = texts
        .join(" ")
        .trim()
        .replace(/\s*,\s*/g, ",")
        .split(/\s+/)
        .filter((vertex) => vertex !== "");
      const read = vertices
        .map((vertex) => vertex.split(",").map(Number))
        .filter(([x, y]) => Number.isFinite(x) && Number.isFinite(y));
      const [first, last] = [read[0], read.at(-1)];
      const open = first !== undefined && last !== undefined && (first[0] !== last[0] || first[1] !== last[1]);
      audit.rings += 1;
      audit.unreadable += vertices.length - read.length;
      if (read.length + (open ? 1 : 0) < 4) audit.short += 1;
      else if (open) audit.open += 1;
    }
  }
  return audit;
}
