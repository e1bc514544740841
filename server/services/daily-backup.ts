import { existsSync, mkdirSync, readdirSync, rmSync, statSync } from "node:fs";
import { join } from "node:path";
import type { DailyCopies, Platform } from "../context.ts";

/** Days of which each has its copy, and months of which the first copy is kept. */
export const DAYS_KEPT = 14;
export const MONTHS_KEPT = 12;

const NAME = /^quillet-(\d{4}-\d{2}-\d{2})\.backup$/;

export interface Copy {
  readonly name: string;
  readonly bytes: number;
  readonly at: string;
}

/** The automatic copies, newest first. */
export function copiesIn(folder: string): Copy[] {
  if (!existsSync(folder)) return [];
  return readdirSync(folder)
    .filter((name) => NAME.test(name))
    .toSorted()
    .toReversed()
    .map((name) => {
      const { size, mtime } = statSync(join(folder, name));
      return { name, bytes: size, at: mtime.toISOString() };
    });
}

/** One round of the daily copies: what goes wrong is kept for the owner to see. */
export async function dailyBackupRound(
  platform: Pick<Platform, "now" | "jobs" | "signingKey">,
  copies: DailyCopies,
  databaseFile: string,
): Promise<void> {
  try {
    await dailyBackup(platform, { databaseFile, folder: copies.folder });
    copies.lastError = null;
  } catch (error) {
    copies.lastError = `${platform.now().toISOString()}: ${error instanceof Error ? error.message : String(error)}`;
    throw error;
  }
}

/** Makes the copy of a day (UTC) where there is none yet, then deletes those that are no longer kept. */
export async function dailyBackup(
  platform: Pick<Platform, "now" | "jobs" | "signingKey">,
  { databaseFile, folder }: { readonly databaseFile: string; readonly folder: string },
): Promise<void> {
  const madeAt = platform.now().toISOString();
  const name = `quillet-${madeAt.slice(0, 10)}.backup`;
  if (copiesIn(folder).some((copy) => copy.name === name)) return;
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const { signingKey } = platform;
  await platform.jobs.run("back-up", { databaseFile, file: join(folder, name), signingKey, madeAt });
  for (const old of noLongerKept(copiesIn(folder).map((copy) => copy.name))) rmSync(join(folder, old), { force: true });
}

/** Of copies newest first: all but the newest 14, and the first of each of the newest 12 months. */
export function noLongerKept(names: readonly string[]): string[] {
  const firstOfMonth = new Map<string, string>();
  for (const name of names) firstOfMonth.set(name.slice(0, "quillet-0000-00".length), name);
  const monthly = new Set([...firstOfMonth.values()].slice(0, MONTHS_KEPT));
  return names.slice(DAYS_KEPT).filter((name) => !monthly.has(name));
}
