import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { Problem } from "#shared/problem.ts";
import { builtInSystem } from "#shared/projection/built-in.ts";
import { checkFrameCrs, crsFromEpsg, type EpsgEntry } from "#shared/projection/crs.ts";

/** One row of the list that the package epsg-index ships; its bbox runs north, west, south, east. */
interface ListedSystem {
  readonly code: string;
  readonly kind: string;
  readonly name: string;
  readonly wkt: string | null;
  readonly proj4: string | null;
  readonly bbox: readonly [number, number, number, number] | null;
  readonly area: string | null;
}

export interface FoundSystem {
  epsg: number;
  name: string;
  /** Where it is meant to be used, or why it cannot be. */
  note: string;
}

/** Numbers above this are other people's, not EPSG's. */
const LAST_EPSG_CODE = 32_767;

const require = createRequire(import.meta.url);
let list: ReadonlyMap<number, ListedSystem> | undefined;

/** The list is 8 MB and takes a quarter of a second to read, so it is read when it is first asked for. */
function theList(): ReadonlyMap<number, ListedSystem> {
  if (list === undefined) {
    const all = JSON.parse(readFileSync(require.resolve("epsg-index/all.json"), "utf8")) as Record<
      string,
      ListedSystem
    >;
    list = new Map(
      Object.values(all)
        .map((system) => [Number(system.code), system] as const)
        .filter(([code]) => code <= LAST_EPSG_CODE),
    );
  }
  return list;
}

/** The EPSG list, for `crsFromText` and its kin. */
export function epsgLookup(code: number): EpsgEntry | undefined {
  const system = theList().get(code);
  return system === undefined ? undefined : entryOf(system);
}

/**
 * Systems whose number begins with the text, or whose name or area of use holds each word of it; best first (exact number,
 * then name with the systems that are met everywhere first, then area of use). Systems that cannot be converted exactly are listed with the reason, at the end.
 */
export function searchEpsg(text: string, limit: number, options: { projectedOnly?: boolean } = {}): FoundSystem[] {
  const words = text
    .trim()
    .toLowerCase()
    .replace(/^epsg\s*:*/, "")
    .split(/[\s/,]+/)
    .filter((word) => word !== "");
  if (words.length === 0) return [];
  const ranked: { rank: number; system: ListedSystem }[] = [];
  for (const system of theList().values()) {
    const kind = kindOf(system);
    if (kind === "other" || (options.projectedOnly === true && kind !== "projected")) continue;
    const rank = rankOf(system, words);
    if (rank !== null) ranked.push({ rank, system });
  }
  ranked.sort((a, b) => a.rank - b.rank || Number(a.system.code) - Number(b.system.code));
  const found = ranked.slice(0, limit).map(({ system }) => describe(system, options.projectedOnly === true));
  return [...found.filter((system) => system.usable), ...found.filter((system) => !system.usable)].map(
    ({ epsg, name, note }) => ({ epsg, name, note }),
  );
}

function rankOf(system: ListedSystem, words: readonly string[]): number | null {
  if (words.length === 1 && words[0] === system.code) return 0;
  if (words.length === 1 && /^\d{3,}$/.test(words[0] ?? "") && system.code.startsWith(words[0] ?? "")) return 1;
  const name = system.name.toLowerCase();
  if (words.every((word) => name.includes(word))) return builtInSystem(Number(system.code)) === undefined ? 3 : 2;
  const place = `${name} ${system.area?.toLowerCase() ?? ""}`;
  return words.every((word) => place.includes(word)) ? 4 : null;
}

function describe(system: ListedSystem, forFrame: boolean): FoundSystem & { usable: boolean } {
  const epsg = Number(system.code);
  const place = (system.area ?? "").split(/[.;](?:\s|$)/)[0] ?? "";
  try {
    const crs = crsFromEpsg(epsg, epsgLookup);
    if (forFrame) checkFrameCrs(crs);
    return {
      epsg,
      name: system.name,
      note: shorten(crs.note === null ? place : `${place}. ${crs.note}`),
      usable: true,
    };
  } catch (error) {
    if (!(error instanceof Problem)) throw error;
    return { epsg, name: system.name, note: error.message, usable: false };
  }
}

function entryOf(system: ListedSystem): EpsgEntry {
  const [north, west, south, east] = system.bbox ?? [90, -180, -90, 180];
  const code = Number(system.code);
  const proj4 = (system.proj4 ?? "").replace(/ \+type=crs\b/, "");
  return {
    code,
    name: system.name,
    proj4: builtInSystem(code)?.proj4 ?? proj4,
    wkt: system.wkt ?? undefined,
    kind: proj4 === "" ? "other" : kindOf(system),
    bounds: [west, south, east, north],
  };
}

function kindOf(system: ListedSystem): EpsgEntry["kind"] {
  if (system.kind === "CRS-PROJCRS") return "projected";
  return system.kind === "CRS-GEOGCRS" || system.kind === "CRS-GEOG3DCRS" ? "geographic" : "other";
}

const shorten = (text: string): string => (text.length <= 160 ? text : `${text.slice(0, 159)}…`);
