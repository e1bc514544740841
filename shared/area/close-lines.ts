import type { FoundLine, FoundPolygons } from "#shared/area/found.ts";
import { extentOf, magnitudeOf } from "#shared/area/plausible.ts";
import { askLines, type AreaAnswers } from "#shared/area/questions.ts";
import { Problem } from "#shared/problem.ts";
import type { Position } from "#shared/projection/transformer.ts";

/** A ring has three corners at least. */
const FEWEST_VERTICES = 3;
/** Metres of a degree of latitude, near enough to say how far two ends lie apart. */
const METRES_A_DEGREE = 111_000;

/**
 * A file that holds lines and no polygon: the lines that somebody named become rings, each closed by a straight edge
 * between its ends, which is told. Files with polygons, and those without a line of three corners, pass as they are.
 * @throws Problem area-question of kind "lines" while nobody has said which lines are meant
 */
export function closeLines(found: FoundPolygons, answers: AreaAnswers): FoundPolygons {
  const lines = found.lines.filter(({ vertices }) => vertices.length >= FEWEST_VERTICES);
  if (found.polygons.length > 0 || lines.length === 0) return found;
  const chosen = answers.lines?.flatMap((place) => lines[place] ?? []) ?? [];
  if (chosen.length === 0) {
    throw askLines(lines.map((line) => ({ name: line.name, vertices: line.vertices.length, gap: gapText(line) })));
  }
  if (chosen.length !== answers.lines?.length) {
    throw new Problem("area-question", "One of the lines to close is not in this file. Choose the file again.");
  }
  return {
    ...found,
    polygons: chosen.map(({ vertices }) => [closed(vertices)]),
    mended: [...found.mended, ...chosen.map((line) => `Closed “${line.name}” to a boundary; ${gapText(line)}.`)],
    others: { ...found.others, lines: found.others.lines - chosen.length },
  };
}

function closed(vertices: readonly Position[]): readonly Position[] {
  const [first, last] = [vertices[0], vertices.at(-1)];
  const meet = first === undefined || last === undefined || (first[0] === last[0] && first[1] === last[1]);
  return meet ? vertices : [...vertices, first];
}

/** "its ends lie 12 m apart", in the file's own units where these are not degrees. */
function gapText({ vertices }: FoundLine): string {
  const [first, last] = [vertices[0], vertices.at(-1)];
  if (first === undefined || last === undefined) return "it has no ends";
  const degrees = magnitudeOf(extentOf([[vertices]])) === "degrees";
  const gap = degrees ? metresBetween(first, last) : Math.hypot(last[0] - first[0], last[1] - first[1]);
  if (gap === 0) return "its ends meet";
  const size = gap < 10 ? gap.toPrecision(2) : String(Math.round(gap));
  return `its ends lie ${size}${degrees ? " m" : " units of the file"} apart`;
}

function metresBetween([lng, lat]: Position, [otherLng, otherLat]: Position): number {
  const shrink = Math.cos((((lat + otherLat) / 2) * Math.PI) / 180);
  return Math.hypot((otherLng - lng) * shrink, otherLat - lat) * METRES_A_DEGREE;
}
