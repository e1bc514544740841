import { eq } from "drizzle-orm";
import type { Reader } from "./open.ts";
import { invitations, members } from "./schema/accounts.ts";
import { areaVersions } from "./schema/area.ts";
import { declarations, draws } from "./schema/draw.ts";
import { visits } from "./schema/field.ts";
import { frameVersions } from "./schema/frame.ts";

const TABLES = {
  areaId: areaVersions,
  frameId: frameVersions,
  declarationId: declarations,
  drawId: draws,
  visitId: visits,
  memberId: members,
  invitationId: invitations,
} as const;

/** Parts of a survey's paths that are no ids. */
const NOT_IDS = new Set(["surveyId", "epsg"]);

/** Whether a part of a path names something that belongs to a survey; throws for one that nobody has declared. */
export function isOwnedParam(name: string): name is keyof typeof TABLES {
  if (NOT_IDS.has(name)) return false;
  if (name in TABLES) return true;
  throw new Error(`path parameter ${name} is not in server/db/belongs.ts`);
}

/** The survey that the thing with this id belongs to. */
export function surveyOf(reader: Reader, param: keyof typeof TABLES, id: string): string | null | undefined {
  const table = TABLES[param];
  return reader.select({ surveyId: table.surveyId }).from(table).where(eq(table.id, id)).get()?.surveyId;
}
