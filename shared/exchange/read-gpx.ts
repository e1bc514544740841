import { gpx } from "@tmcw/togeojson";
import type { Document, Element } from "@xmldom/xmldom";
import type { FoundLine, FoundPolygons } from "#shared/area/found.ts";
import { readGeoJson } from "#shared/exchange/geojson.ts";
import { parseXml } from "#shared/exchange/xml.ts";
import { Problem } from "#shared/problem.ts";

/**
 * GPX (always longitude and latitude of WGS 84) to the lines of its tracks and routes; a boundary only where somebody closes
 * one of them. The pieces of a track, which break off where the signal was lost, are joined in their order, and told.
 * What the converter from npm gives is compared with the points in the document.
 * @throws Problem file-unsafe, file-damaged, file-unknown.
 */
export function readGpx(text: string): FoundPolygons {
  const document = parseXml(text, "GPX");
  if (document.documentElement?.localName !== "gpx") {
    throw new Problem(
      "file-unknown",
      `This is XML, but not GPX: its outermost element is “${document.documentElement?.nodeName ?? "none"}”. Export the track again.`,
    );
  }
  const tracks = linesOf(document);
  const found = readGeoJson(JSON.stringify(gpx(document)));
  const read = found.lines.reduce((sum, { vertices }) => sum + vertices.length, 0);
  const written = tracks.reduce((sum, { points }) => sum + points, 0);
  if (read !== written) {
    throw new Problem(
      "file-damaged",
      `The tracks and routes of this GPX hold ${written} points, but only ${read} can be read: some have no position. Export it again; nothing is left out silently.`,
    );
  }
  const { lines, notes } = joined(tracks, found.lines);
  return {
    ...found,
    format: "GPX",
    crs: {
      kind: "stated",
      text: "EPSG:4326",
      howKnown: "GPX is always in longitude and latitude of WGS 84",
      byFile: true,
    },
    lines,
    others: { ...found.others, lines: lines.length },
    notes,
  };
}

interface TrackInFile {
  readonly name: string;
  readonly points: number;
  /** Pieces that the converter makes a line of: those with two points at least. */
  readonly pieces: number;
}

/** Tracks, then routes, as the converter takes them. Pieces of one point make no line, and are none. */
function linesOf(document: Document): TrackInFile[] {
  const tracks = [...document.getElementsByTagNameNS("*", "trk")].map((track, index) =>
    lineIn(track, [...track.getElementsByTagNameNS("*", "trkseg")], "trkpt", `track ${index + 1}`),
  );
  const routes = [...document.getElementsByTagNameNS("*", "rte")].map((route, index) =>
    lineIn(route, [route], "rtept", `route ${index + 1}`),
  );
  return [...tracks, ...routes].filter(({ pieces }) => pieces > 0);
}

function lineIn(element: Element, pieces: readonly Element[], point: string, otherwise: string): TrackInFile {
  const name = [...element.childNodes].find((child) => child.localName === "name")?.textContent?.trim() ?? "";
  const lengths = pieces.map((piece) => piece.getElementsByTagNameNS("*", point).length).filter((length) => length > 1);
  return {
    name: name === "" ? otherwise : name,
    points: lengths.reduce((sum, length) => sum + length, 0),
    pieces: lengths.length,
  };
}

function joined(tracks: readonly TrackInFile[], found: readonly FoundLine[]): { lines: FoundLine[]; notes: string[] } {
  const notes: string[] = [];
  let at = 0;
  const lines = tracks.map(({ name, pieces }) => {
    const vertices = found.slice(at, at + pieces).flatMap((piece) => piece.vertices);
    at += pieces;
    if (pieces > 1) notes.push(`“${name}” is in ${pieces} pieces; joined them in their order.`);
    return { name, vertices };
  });
  return { lines, notes };
}
