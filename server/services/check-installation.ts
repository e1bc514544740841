import { replay } from "#shared/record/replay.ts";
import type { Platform } from "../context.ts";
import { newestEvent } from "../db/events.ts";
import type { Db } from "../db/open.ts";
import { allSurveys } from "../db/surveys.ts";
import { buildRecord } from "./build-record.ts";

/** What a walk through the whole database found. */
export interface InstallationCheck {
  readonly ok: boolean;
  readonly database: {
    /** SQLite's own words where its structure is damaged. */
    readonly damage: readonly string[];
    readonly brokenForeignKeys: number;
    /** Guards against changing what is sealed. */
    readonly triggers: number;
  };
  readonly surveys: readonly {
    readonly id: string;
    readonly events: number;
    readonly newestSha256: string;
    readonly checks: { readonly passed: number; readonly failed: number; readonly notChecked: number };
    /** Each with its first difference. */
    readonly failures: readonly string[];
  }[];
}

/** Walks the database's structure, and replays each survey's record: chain, signatures, frames, draws, counts, estimates. */
export function checkInstallation(
  platform: Pick<Platform, "db" | "now" | "signingKey" | "version">,
): InstallationCheck {
  const database = checkDatabase(platform.db);
  const surveys = allSurveys(platform.db).map(({ id }) => checkSurvey(platform, id));
  const whole = database.damage.length === 0 && database.brokenForeignKeys === 0 && database.triggers > 0;
  return { ok: whole && surveys.every(({ checks }) => checks.failed === 0), database, surveys };
}

function checkDatabase(db: Db): InstallationCheck["database"] {
  const sqlite = db.$client;
  const damage = sqlite.pragma("integrity_check") as { integrity_check: string }[];
  return {
    damage: damage.map((row) => row.integrity_check).filter((line) => line !== "ok"),
    brokenForeignKeys: (sqlite.pragma("foreign_key_check") as unknown[]).length,
    triggers: Number(sqlite.prepare("SELECT count(*) FROM sqlite_master WHERE type = 'trigger'").pluck().get()),
  };
}

function checkSurvey(
  platform: Pick<Platform, "db" | "now" | "signingKey" | "version">,
  id: string,
): InstallationCheck["surveys"][number] {
  const newest = newestEvent(platform.db, id);
  const { checks, summary } = replay(buildRecord(platform, id));
  return {
    id,
    events: newest?.sequence ?? 0,
    newestSha256: newest?.sha256 ?? "",
    checks: { passed: summary.passed, failed: summary.failed, notChecked: summary.notChecked },
    failures: checks.filter(({ outcome }) => outcome === "failed").map(({ title, detail }) => `${title}: ${detail}`),
  };
}
