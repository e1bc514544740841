import * as z from "zod/mini";
import { Problem, type ProblemCode } from "#shared/problem.ts";
import type { LngLat } from "#shared/units/metric.ts";

export type Magnitude = "degrees" | "metres" | "unknown";

/** A question rides on the refusal that asks it. The next request answers with the same file and what was asked for. */
export type AreaQuestion =
  | {
      readonly kind: "crs";
      readonly why: string;
      readonly looksLike: Magnitude;
      readonly suggestions: readonly { readonly epsg: number; readonly name: string; readonly note: string }[];
    }
  | { readonly kind: "layer"; readonly why: string; readonly layers: readonly string[] }
  /** The file holds lines and no polygon: which of them are boundaries to be closed. `gap` is how far its ends lie apart. */
  | {
      readonly kind: "lines";
      readonly why: string;
      readonly lines: readonly { readonly name: string; readonly vertices: number; readonly gap: string }[];
    }
  /** Longitude and latitude look exchanged: what the place would be either way; null where it would be no place at all. */
  | {
      readonly kind: "axes";
      readonly why: string;
      readonly asWritten: LngLat | null;
      readonly exchanged: LngLat | null;
    }
  /** Nothing to answer: a place to show on the map beside the refusal. */
  | { readonly kind: "place"; readonly why: string; readonly at: LngLat };

/** Answers to the questions, as the client sends them with the file. */
export const areaAnswers = z.object({
  /** An EPSG code as text ("25831" or "EPSG:25831"), a PROJ text or WKT. */
  crs: z.optional(z.string().check(z.trim(), z.maxLength(4000))),
  layer: z.optional(z.string().check(z.maxLength(300))),
  /** Places, in the list of the question, of the lines to close to a boundary. */
  lines: z.optional(z.readonly(z.array(z.int().check(z.minimum(0))).check(z.maxLength(1000)))),
  /** The first coordinate of the file is the latitude. */
  axes: z.optional(z.literal("exchanged")),
});
export type AreaAnswers = z.infer<typeof areaAnswers>;

/** Asks for the coordinate reference system; nothing is assumed. */
export function askCrs(why: string, looksLike: Magnitude): Problem {
  const suggestions =
    looksLike === "degrees"
      ? [{ epsg: 4326, name: "WGS 84", note: "longitude and latitude, as GPS units give them" }]
      : [];
  const question = { kind: "crs", why, looksLike, suggestions } as const satisfies AreaQuestion;
  return new Problem("area-question", `${why} Say which coordinate reference system the file is in.`, question);
}

export function askLayer(layers: readonly string[]): Problem {
  const why = `The archive holds ${layers.length} layers: ${layers.join(", ")}.`;
  const question = { kind: "layer", why, layers } as const satisfies AreaQuestion;
  return new Problem("area-question", `${why} Say which one is the study area.`, question);
}

export function askLines(lines: readonly { name: string; vertices: number; gap: string }[]): Problem {
  const why = lines.length === 1 ? "Found a line and no polygon." : `Found ${lines.length} lines and no polygon.`;
  const question = { kind: "lines", why, lines } as const satisfies AreaQuestion;
  return new Problem("area-question", `${why} Say which to close to a boundary.`, question);
}

export function askAxes(why: string, asWritten: LngLat | null, exchanged: LngLat | null): Problem {
  const question = { kind: "axes", why, asWritten, exchanged } as const satisfies AreaQuestion;
  return new Problem(
    "coordinates-swapped",
    `${why} Say whether they are, or write the file again with longitude (east) first, then latitude (north).`,
    question,
  );
}

/** A refusal that is about one place; the client shows it on the map. */
export function askPlace(code: ProblemCode, why: string, at: LngLat): Problem {
  const question = { kind: "place", why, at } as const satisfies AreaQuestion;
  return new Problem(code, why, question);
}
