import { and, eq, isNull } from "drizzle-orm";
import type { Role } from "#shared/access/table.ts";
import type { AreaRow } from "./areas.ts";
import type { Reader, Tx } from "./open.ts";
import { accounts, members, memberships } from "./schema/accounts.ts";
import { areaVersions, planes, zones } from "./schema/area.ts";
import { seasons, surveys, targets } from "./schema/surveys.ts";
import type { SeasonRow, SurveyRow, TargetRow } from "./surveys.ts";

/** A survey with a season and any number of targets. */
export function insertWholeSurvey(tx: Tx, survey: SurveyRow, season: SeasonRow, of: readonly TargetRow[]): void {
  tx.insert(surveys).values(survey).run();
  tx.insert(seasons).values(season).run();
  for (const target of of) tx.insert(targets).values(target).run();
}

type NewArea = Pick<AreaRow, "id" | "surveyId" | "number" | "importedBy" | "createdAt">;

/** Copies an area version with its file, its zones and its planes, so that nothing is ever projected twice (rule R1). */
export function copyArea(tx: Tx, fromId: string, area: NewArea, newId: () => string): AreaRow {
  const from = tx.select().from(areaVersions).where(eq(areaVersions.id, fromId)).get();
  if (!from) throw new Error(`area ${fromId} vanished`);
  const row: AreaRow = { ...from, ...area };
  tx.insert(areaVersions).values(row).run();
  for (const zone of tx.select().from(zones).where(eq(zones.areaVersionId, fromId)).all()) {
    tx.insert(zones)
      .values({ ...zone, id: newId(), areaVersionId: area.id })
      .run();
  }
  for (const plane of tx.select().from(planes).where(eq(planes.areaVersionId, fromId)).all()) {
    tx.insert(planes)
      .values({ ...plane, areaVersionId: area.id })
      .run();
  }
  return row;
}

export interface RoleHeld {
  readonly accountId: string;
  readonly name: string;
  readonly role: Role;
}

/** The roles held now by people who can sign in, one row a role, in the order in which they were added. */
export function rolesHeld(reader: Reader, surveyId: string): RoleHeld[] {
  return reader
    .select({ accountId: accounts.id, name: accounts.name, role: memberships.role })
    .from(members)
    .innerJoin(accounts, eq(accounts.id, members.accountId))
    .innerJoin(memberships, eq(memberships.memberId, members.id))
    .where(and(eq(members.surveyId, surveyId), isNull(memberships.removedAt), isNull(accounts.closedAt)))
    .orderBy(members.addedAt, members.id)
    .all();
}
