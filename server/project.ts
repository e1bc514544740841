import { existsSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";

/** The project's top folder: the same from server/ in development and from dist/server/ when built. */
export function projectRoot(): string {
  for (let folder = dirname(fileURLToPath(import.meta.url)); ; folder = dirname(folder)) {
    if (existsSync(join(folder, "drizzle", "meta", "_journal.json"))) return folder;
    if (folder === dirname(folder)) throw new Error(`no project folder above ${fileURLToPath(import.meta.url)}`);
  }
}

export function version(root: string): string {
  return (JSON.parse(readFileSync(join(root, "package.json"), "utf8")) as { version: string }).version;
}
