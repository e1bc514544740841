import type { LngLat } from "#shared/units/metric.ts";

export interface Waypoint extends LngLat {
  readonly name: string;
  /** A short line that most units show. */
  readonly comment: string;
  /** A longer text; many units leave it out. */
  readonly description: string;
  /** A symbol's name as GPS units know it, such as "Flag, Blue". */
  readonly symbol?: string;
}

export interface GpxMeta {
  readonly name: string;
  readonly description: string;
  /** UTC, ISO 8601 with Z. */
  readonly time: string;
}

/** All that XML 1.0 can't hold, escaped or not: control characters, halves of surrogate pairs, U+FFFE and U+FFFF. */
const NOT_XML = /[^\t\n\r\u{20}-\u{D7FF}\u{E000}-\u{FFFD}\u{10000}-\u{10FFFF}]/gu;
const ESCAPES: Readonly<Record<string, string>> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
  "'": "&apos;",
  "\r": "&#13;",
};

/** Seven decimals: about a centimetre. Never an exponent, never −0. */
function fixed(degrees: number): string {
  const text = degrees.toFixed(7);
  return text === "-0.0000000" ? "0.0000000" : text;
}

function latitude(lat: number): string {
  if (!(lat >= -90 && lat <= 90)) throw new RangeError(`a latitude lies between -90 and 90, got ${lat}`);
  return fixed(lat);
}

/** GPX wants −180 ≤ longitude < 180, after rounding too. */
function longitude(lng: number): string {
  if (!(lng >= -180 && lng <= 180)) throw new RangeError(`a longitude lies between -180 and 180, got ${lng}`);
  const text = fixed(lng);
  return text === "180.0000000" ? "-180.0000000" : text;
}

/** Writes text for XML and counts what had to be dropped. */
class TextWriter {
  dropped = 0;

  element(name: string, text: string | undefined): string {
    if (text === undefined || text === "") return "";
    const held = text.replace(NOT_XML, () => {
      this.dropped += 1;
      return "";
    });
    return `<${name}>${held.replace(/[&<>"'\r]/g, (character) => ESCAPES[character] ?? character)}</${name}>`;
  }
}

/**
 * A GPX 1.1 file of waypoints in WGS 84, in the order given. Child elements stand in the order that the schema wants
 * (name, cmt, desc, sym), coordinates have seven fixed decimals. Characters that XML 1.0 can't hold are dropped and counted
 * in the notes.
 * @throws RangeError for a place that is not on the globe, or a time that is not UTC.
 */
export function writeGpx(waypoints: readonly Waypoint[], meta: GpxMeta): { value: string; notes: string[] } {
  if (!/^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d(\.\d+)?Z$/.test(meta.time)) {
    throw new RangeError(`not a time in UTC: "${meta.time}"`);
  }
  const writer = new TextWriter();
  const lines = [
    '<?xml version="1.0" encoding="UTF-8"?>',
    '<gpx version="1.1" creator="Quillet" xmlns="http://www.topografix.com/GPX/1/1">',
    `<metadata>${writer.element("name", meta.name)}${writer.element("desc", meta.description)}<time>${meta.time}</time></metadata>`,
    ...waypoints.map(
      (point) =>
        `<wpt lat="${latitude(point.lat)}" lon="${longitude(point.lng)}">` +
        writer.element("name", point.name) +
        writer.element("cmt", point.comment) +
        writer.element("desc", point.description) +
        writer.element("sym", point.symbol) +
        "</wpt>",
    ),
    "</gpx>",
    "",
  ];
  const notes =
    writer.dropped === 0 ? [] : [`Characters that a GPX file cannot hold were left out: ${writer.dropped}.`];
  return { value: lines.join("\n"), notes };
}
