import type { Declaration, DrawDetail, DrawEntry, listDraws } from "#shared/api/draw.ts";
import type * as z from "zod/mini";
import type { CountRow } from "../db/counts.ts";
import type { EntryRow } from "../db/draws.ts";
import { entryStates } from "../services/draw-in-use.ts";
import type { DeclarationView, DrawSummaryView, DrawsView, DrawView } from "../services/read-draws.ts";

type Names = ReadonlyMap<string, string>;
type DrawSummary = Omit<DrawDetail, "declaration" | "entries">;

const nameOf = (names: Names, memberId: string): string => names.get(memberId) ?? "somebody";

export function presentDeclaration({ state, declared, names, seedShown }: DeclarationView): Declaration {
  const { declaration, seed, abandoned, drawId } = state;
  return {
    id: declaration.id,
    frameId: declaration.frameVersionId,
    frameNumber: state.frameNumber,
    frameSha256: declared.frameSha256,
    units: state.units,
    design: declared.design,
    generator: declared.generator,
    reserves: declared.reserves,
    limits: declared.limits,
    level: declared.level,
    seedSource: declared.seedSource.kind,
    note: declared.note,
    sha256: declaration.sha256,
    declaredAt: declaration.declaredAt,
    declaredBy: nameOf(names, declaration.declaredBy),
    state: drawId !== null ? "drawn" : abandoned !== null ? "abandoned" : "open",
    seed: seed && seedShown ? { text: seed.text, at: seed.givenAt, by: nameOf(names, seed.givenBy) } : null,
    abandoned: abandoned && {
      at: abandoned.abandonedAt,
      by: nameOf(names, abandoned.abandonedBy),
      reason: abandoned.reason,
    },
    drawId,
  };
}

export function presentDrawSummary({ state, lists, names }: DrawSummaryView): DrawSummary {
  const { draw, withdrawn } = state;
  const inUse = lists.flatMap((list) => list.use.inUse);
  return {
    id: draw.id,
    number: draw.number,
    declarationId: draw.declarationId,
    frameId: draw.frameVersionId,
    state: withdrawn === null ? "live" : "withdrawn",
    drawnAt: draw.drawnAt,
    drawnBy: nameOf(names, draw.drawnBy),
    picks: inUse.length,
    cellsToVisit: new Set(inUse.map((entry) => entry.unit)).size,
    reserves: lists.reduce((sum, list) => sum + list.entries.length - list.picks, 0),
    withdrawn: withdrawn && {
      at: withdrawn.withdrawnAt,
      by: nameOf(names, withdrawn.withdrawnBy),
      reason: withdrawn.reason,
    },
  };
}

export function presentDraws(view: DrawsView): z.input<typeof listDraws.answer.schema> {
  return {
    declarations: view.declarations.map(presentDeclaration),
    draws: view.draws.map(presentDrawSummary),
    liveDrawId: view.liveDrawId,
    reasonNeeded: view.reasonNeeded,
  };
}

export function presentDraw(view: DrawView): DrawDetail {
  const entries = view.lists.flatMap((list) => {
    const states = entryStates(list);
    return list.entries.flatMap((row) => {
      const visitId = view.visits.get(row.unit)?.id ?? null;
      if (!view.own.all && (visitId === null || !view.own.has(visitId))) return [];
      const standing = states.get(row.position);
      if (!standing) throw new Error(`entry ${row.position} of draw ${row.drawId} has no state`);
      return [presentEntry(row, standing, visitId, visitId === null ? undefined : view.counts.get(visitId))];
    });
  });
  return { ...presentDrawSummary(view), declaration: presentDeclaration(view.declaration), entries };
}

function presentEntry(
  row: EntryRow,
  standing: Pick<DrawEntry, "state" | "openedFor">,
  visitId: string | null,
  count: CountRow | undefined,
): DrawEntry {
  const { stratum, position, unit, column, label, repeatOf, reserve } = row;
  return {
    ...{ stratum, position, unit, column, row: row.row, label, repeatOf, reserve },
    ...standing,
    visitId,
    count: countState(count),
  };
}

function countState(count: CountRow | undefined): DrawEntry["count"] {
  if (count === undefined) return "not-visited";
  return count.state === "counted" && count.value === 0 ? "zero" : count.state;
}
