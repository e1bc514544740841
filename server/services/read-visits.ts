import type { Context } from "../context.ts";
import { type CountRow, entriesInForce } from "../db/counts.ts";
import { type DrawState, liveDraw } from "../db/draws.ts";
import { memberNames } from "../db/members.ts";
import type { Reader } from "../db/open.ts";
import { currentSeason, type TargetRow } from "../db/surveys.ts";
import { type AssignmentView, assignmentsOf, findVisit, type VisitRow, visitsOn } from "../db/visits.ts";
import { completePrefix } from "#shared/field/prefix.ts";
import type { VisitState } from "#shared/field/states.ts";
import { drawInUse, entryStates, type StratumInUse } from "./draw-in-use.ts";
import { framePlaces, type FramePlaces, type Place } from "./frame-places.ts";
import { firstTarget } from "./first-target.ts";
import { ownCells } from "./own-cells.ts";

/** A cell to visit, with all that a list, a sheet or a GPS unit says of it. */
export interface VisitView {
  readonly visit: VisitRow;
  readonly label: string;
  readonly shareBillionths: number;
  /** Positions in the draw, in draw order; none where its draw is not in use. */
  readonly orders: readonly number[];
  readonly closed: boolean;
  readonly openedFor: number | null;
  readonly centre: Place;
  readonly assignment: AssignmentView | undefined;
  readonly count: CountRow | undefined;
  readonly names: ReadonlyMap<string, string>;
}

/** What a season has in use: its draw as its acts have left it, and what is counted. */
export interface SeasonInUse {
  readonly seasonId: string;
  readonly target: TargetRow;
  readonly live: DrawState | undefined;
  readonly lists: readonly StratumInUse[];
  /** Counts in force for the target, by visit. */
  readonly counts: ReadonlyMap<string, CountRow>;
}

export interface VisitsView {
  readonly season: SeasonInUse;
  readonly visits: readonly VisitView[];
  readonly picks: number;
  readonly reservesLeft: number;
  readonly completePrefix: number;
}

export function seasonInUse(reader: Reader, surveyId: string): SeasonInUse {
  const seasonId = currentSeason(reader, surveyId).id;
  const target = firstTarget(reader, surveyId);
  const live = liveDraw(reader, seasonId);
  return {
    seasonId,
    target,
    live,
    lists: live ? drawInUse(reader, live.draw.id, seasonId) : [],
    counts: entriesInForce(reader, seasonId, target.id),
  };
}

/** The cells to visit, in draw order; for a counter those that are assigned to them. */
export function listVisits(ctx: Context, reader: Reader = ctx.db): VisitsView {
  const season = seasonInUse(reader, ctx.surveyId);
  const { live, lists } = season;
  const rows = live ? visitsOn(reader, season.seasonId, live.draw.frameVersionId) : [];
  const own = ownCells(ctx, reader);
  const byUnit = new Map(rows.map((row) => [row.unit, row]));
  const units = lists.flatMap((list) =>
    list.entries.filter((entry) => entry.position <= list.use.openedTo).map((entry) => entry.unit),
  );
  const wanted = [...new Set(units)].flatMap((unit) => byUnit.get(unit) ?? []).filter((visit) => own.has(visit.id));
  const states = new Map(
    rows.flatMap((visit): [number, VisitState][] => {
      const count = season.counts.get(visit.id);
      return count ? [[visit.unit, count.state]] : [];
    }),
  );
  return {
    season,
    visits: viewsOf(reader, ctx.surveyId, season, wanted),
    picks: lists.reduce((sum, list) => sum + list.use.inUse.length, 0),
    reservesLeft: lists.reduce((sum, list) => sum + list.use.reservesLeft, 0),
    completePrefix: lists.reduce((sum, list) => sum + completePrefix(list.use, states).complete, 0),
  };
}

/** These visits as they stand now, in the order asked for. */
export function viewVisits(ctx: Context, visitIds: readonly string[]): VisitView[] {
  const rows = [...new Set(visitIds)].map((id) => {
    const visit = findVisit(ctx.db, id);
    if (!visit) throw new Error(`visit ${id} vanished`);
    return visit;
  });
  return viewsOf(ctx.db, ctx.surveyId, seasonInUse(ctx.db, ctx.surveyId), rows);
}

export function viewVisit(ctx: Context, visitId: string): VisitView {
  const [view] = viewVisits(ctx, [visitId]);
  if (!view) throw new Error(`visit ${visitId} vanished`);
  return view;
}

function viewsOf(reader: Reader, surveyId: string, season: SeasonInUse, visits: readonly VisitRow[]): VisitView[] {
  const names = memberNames(reader, surveyId);
  const assignments = new Map(assignmentsOf(reader, surveyId).map((row) => [row.visitId, row]));
  const places = new Map<string, FramePlaces>();
  const standings = standingOfUnits(season.lists);
  return visits.map((visit) => {
    const place = places.get(visit.frameVersionId) ?? framePlaces(reader, visit.frameVersionId);
    places.set(visit.frameVersionId, place);
    const inLiveDraw = visit.seasonId === season.seasonId && visit.frameVersionId === season.live?.draw.frameVersionId;
    const standing = inLiveDraw ? standings.get(visit.unit) : undefined;
    return {
      visit,
      label: place.labelOf(visit.column, visit.row),
      shareBillionths: place.shareOf(visit.unit),
      orders: standing?.orders ?? [],
      closed: standing?.closed ?? true,
      openedFor: standing?.openedFor ?? null,
      centre: place.centreOf(visit.column, visit.row),
      assignment: assignments.get(visit.id),
      count: season.counts.get(visit.id),
      names,
    };
  });
}

interface UnitStanding {
  readonly orders: number[];
  readonly closed: boolean;
  readonly openedFor: number | null;
}

/** Positions of each unit that is in use or closed. */
function standingOfUnits(lists: readonly StratumInUse[]): Map<number, UnitStanding> {
  const units = new Map<number, UnitStanding>();
  for (const list of lists) {
    const states = entryStates(list);
    for (const entry of list.entries) {
      const standing = states.get(entry.position);
      if (standing?.state !== "in-use" && standing?.state !== "closed") continue;
      const known = units.get(entry.unit);
      if (known) known.orders.push(entry.position);
      else {
        const { state, openedFor } = standing;
        units.set(entry.unit, { orders: [entry.position], closed: state === "closed", openedFor });
      }
    }
  }
  return units;
}
