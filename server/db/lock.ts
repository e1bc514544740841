import Database from "better-sqlite3";
import { Problem } from "#shared/problem.ts";

/**
 * Makes this process the only server on a database file. The lock is an exclusive transaction on a small file beside it, so
 * the operating system lets go of it when the process ends, however it ends. Returns what gives it back.
 * @throws Problem `already-served` while another process holds it
 */
export function lockForServing(databaseFile: string): () => void {
  const lock = new Database(`${databaseFile}.lock`, { timeout: 0 });
  try {
    lock.exec("BEGIN EXCLUSIVE");
  } catch (error) {
    lock.close();
    if ((error as { code?: unknown }).code !== "SQLITE_BUSY") throw error;
    throw new Problem(
      "already-served",
      `Another Quillet serves ${databaseFile}. Stop that one first, or give this one a QUILLET_DATA of its own.`,
    );
  }
  return () => lock.close();
}
