import { sql, type SQL } from "drizzle-orm";
import type { SQLiteTable } from "drizzle-orm/sqlite-core";
import { standsOn } from "./elsewhere.ts";
import type { Tx } from "./open.ts";
import { invitations, members, memberships } from "./schema/accounts.ts";
import { areaVersions, planes, zones } from "./schema/area.ts";
import { countEntries, countImports } from "./schema/counts.ts";
import {
  declarations,
  declarationsAbandoned,
  drawEntries,
  draws,
  drawsWithdrawn,
  seasonDraws,
  seeds,
} from "./schema/draw.ts";
import { assignments, pickActs, visits } from "./schema/field.ts";
import { frameVersions } from "./schema/frame.ts";
import { deletedSurveys } from "./schema/installation.ts";
import { mails } from "./schema/mail.ts";
import { events, keptEstimates } from "./schema/record.ts";
import { seasons, surveys, targets } from "./schema/surveys.ts";

type DeletedSurveyRow = Omit<typeof deletedSurveys.$inferSelect, "sourceSha256s" | "frameSha256s">;

/**
 * Deletes every row of a survey in every table, and keeps that it was there. Only inside `withoutTriggers`: most of these
 * rows are guarded. What points at a row goes before it.
 */
export function deleteEverythingOf(tx: Tx, row: DeletedSurveyRow): void {
  const { id } = row;
  const stoodOn = standsOn(tx, id);
  const of = (table: SQLiteTable): SQL => sql`(select id from ${table} where survey_id = ${id})`;
  const within: readonly (readonly [SQLiteTable, SQL])[] = [
    [countEntries, sql`visit_id in ${of(visits)}`],
    [assignments, sql`visit_id in ${of(visits)}`],
    [pickActs, sql`draw_id in ${of(draws)}`],
    [seasonDraws, sql`season_id in ${of(seasons)}`],
    [drawsWithdrawn, sql`draw_id in ${of(draws)}`],
    [drawEntries, sql`draw_id in ${of(draws)}`],
    [seeds, sql`declaration_id in ${of(declarations)}`],
    [declarationsAbandoned, sql`declaration_id in ${of(declarations)}`],
    [planes, sql`area_version_id in ${of(areaVersions)}`],
    [zones, sql`area_version_id in ${of(areaVersions)}`],
  ];
  for (const [table, where] of within) tx.delete(table).where(where).run();
  const direct = [countImports, visits, draws, declarations, keptEstimates, events, frameVersions, areaVersions];
  for (const table of direct)
    tx.delete(table)
      .where(sql`survey_id = ${id}`)
      .run();
  tx.delete(memberships)
    .where(sql`member_id in ${of(members)}`)
    .run();
  for (const table of [members, invitations, mails, targets, seasons]) {
    tx.delete(table)
      .where(sql`survey_id = ${id}`)
      .run();
  }
  tx.delete(surveys)
    .where(sql`id = ${id}`)
    .run();
  tx.insert(deletedSurveys)
    .values({ ...row, ...stoodOn })
    .run();
}
