import { type CsvValue, writeCsv } from "#shared/exchange/csv.ts";
import type { Figure, Limits, Quantity } from "#shared/estimate/result.ts";
import type { Context } from "../context.ts";
import { findSurvey } from "../db/surveys.ts";
import { entryStates } from "./draw-in-use.ts";
import { fileNamePart } from "./file-name-part.ts";
import { type EstimateView, readEstimate } from "./read-estimate.ts";

export interface EstimateFile {
  readonly name: string;
  readonly text: string;
}

/** The picks with their counts, or the figures of the estimate, as a table. */
export function exportEstimate(ctx: Context, table: "picks" | "figures"): EstimateFile {
  const view = readEstimate(ctx);
  const survey = findSurvey(ctx.db, ctx.surveyId)?.name ?? "survey";
  const name = `${fileNamePart(`${survey} ${view.season.name}`)}-estimate-${table}.csv`;
  return { name, text: table === "picks" ? picksTable(view) : figuresTable(view) };
}

const PICK_COLUMNS = [
  "pick",
  "unit",
  "label",
  "column",
  "row",
  "use",
  "repeat_of",
  "state",
  "count",
  "counted_at",
  "note",
  "record_event",
  "record_sha256",
];

/**
 * A row for each entry that is or was in use, in draw order. Those in use, by `pick,unit,count,state`, give the estimate
 * again; a cell without a count has an empty one, never a zero. The newest event and its hash stand in each row: a witness
 * outside the database.
 */
function picksTable({ lists, standing, newest }: EstimateView): string {
  const rows = lists.flatMap((list) => {
    const states = entryStates(list);
    return list.entries
      .filter((entry) => entry.position <= list.use.openedTo)
      .map((entry): CsvValue[] => {
        const count = standing.get(entry.unit)?.inForce;
        return [
          entry.position,
          entry.unit,
          entry.label,
          entry.column,
          entry.row,
          states.get(entry.position)?.state ?? "in-use",
          entry.repeatOf,
          count?.state ?? "not-visited",
          count?.value ?? null,
          count?.madeAt ?? null,
          count?.note ?? null,
          newest.sequence,
          newest.sha256,
        ];
      });
  });
  return writeCsv(PICK_COLUMNS, rows);
}

const FIGURE_COLUMNS = [
  "quantity",
  "estimate",
  "standard_error",
  "lower_t",
  "upper_t",
  "lower_log_normal",
  "upper_log_normal",
  "unit",
];

const figure = (value: Figure): CsvValue => (value.kind === "known" ? value.value : null);
const limits = (value: Limits): CsvValue[] => (value.kind === "interval" ? [value.lower, value.upper] : [null, null]);

function quantityRow(name: string, quantity: Quantity, unit: string): CsvValue[] {
  const { estimate, standardError } = quantity;
  return [
    name,
    estimate,
    figure(standardError),
    ...limits(quantity.limits.t),
    ...limits(quantity.limits.logNormal),
    unit,
  ];
}

function figureRow(name: string, value: CsvValue, unit: string): CsvValue[] {
  return [name, value, null, null, null, null, null, unit];
}

/** Limits as computed; a figure that can't be given is an empty cell. */
function figuresTable({ result, newest }: EstimateView): string {
  return writeCsv(FIGURE_COLUMNS, [
    quantityRow("total", result.total, "objects"),
    quantityRow("mean", result.mean, "objects a cell"),
    ...(result.density.kind === "known" ? [quantityRow("density", result.density, "objects a hectare")] : []),
    figureRow("coefficient_of_variation", figure(result.coefficientOfVariation), "share"),
    figureRow("sample_variance", figure(result.sampleVariance), "objects squared"),
    figureRow("degrees_of_freedom", result.degreesOfFreedom, ""),
    figureRow("level", result.level, "share"),
    figureRow("units", result.units, "cells"),
    figureRow("picks_in_use", result.picksInUse, "picks"),
    figureRow("picks_counted", result.picksCounted, "picks"),
    figureRow("distinct_cells", result.distinctCells, "cells"),
    figureRow("seen", result.seen, "objects"),
    ...(result.allZero.kind === "all-zero"
      ? [
          figureRow("upper_limit_all_zero_poisson_two_sided", result.allZero.twoSided, "objects"),
          figureRow("upper_limit_all_zero_poisson_one_sided", result.allZero.oneSided, "objects"),
        ]
      : []),
    figureRow("record_event", newest.sequence, newest.sha256),
  ]);
}
