import { distinctUnits, drawEntries } from "#shared/draw/draw.ts";
import { GENERATORS } from "#shared/draw/generator.ts";
import { labelOf, unitAt } from "#shared/frame/list.ts";
import { frameSha256, parseStatement, rebuildCells } from "#shared/frame/statement.ts";
import { DESIGNS, LATER_DESIGNS } from "./estimate.ts";
import { readText } from "./files.ts";
import { needed, notInThisVersion, oneOf, options, printJson, wholeNumber } from "./usage.ts";

const KNOWN = {
  frame: { type: "string" },
  design: { type: "string" },
  n: { type: "string" },
  step: { type: "string" },
  starts: { type: "string" },
  seed: { type: "string" },
  generator: { type: "string" },
  reserves: { type: "string" },
} as const;

/** `quillet draw`: the list of a draw from a frame statement, picks first, then reserves. */
export function draw(args: readonly string[]): number {
  const { values } = options(args, KNOWN, 0);
  const kind = oneOf(needed(values.design, "--design"), "--design", DESIGNS, LATER_DESIGNS);
  for (const name of ["step", "starts"] as const) if (values[name] !== undefined) throw notInThisVersion(`--${name}`);
  const wanted = needed(values.n, "--n");
  if (wanted.includes("=")) throw notInThisVersion("--n with strata");
  const design = { kind, n: wholeNumber(wanted, "--n") };
  const generator = oneOf(values.generator ?? "sha256-counter", "--generator", GENERATORS);
  const reserves = wholeNumber(values.reserves ?? "0", "--reserves");
  const seed = needed(values.seed, "--seed");
  const statement = parseStatement(readText(needed(values.frame, "--frame")));
  const cells = rebuildCells(statement);
  const sha256 = frameSha256(statement);
  const lists = drawEntries({ sha256, units: cells.units }, design, seed, generator, reserves);
  const all = lists.flatMap(({ stratum, entries }) => entries.map((entry) => ({ stratum, entry })));
  const inUse = all.filter(({ entry }) => !entry.reserve);
  const picks = [...inUse, ...all.filter(({ entry }) => entry.reserve)].map(({ stratum, entry }) => {
    const { column, row } = unitAt(cells, entry.unit);
    return {
      order: entry.position,
      unit: entry.unit,
      column,
      row,
      label: labelOf(cells, column, row),
      stratum,
      start: null,
      repeatOf: entry.repeatOf,
      reserve: entry.reserve,
    };
  });
  printJson({ frameSha256: sha256, picks, distinct: distinctUnits(inUse.map(({ entry }) => entry)) });
  return 0;
}
