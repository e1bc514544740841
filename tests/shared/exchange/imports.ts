import { existsSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";

const at = (path: string): string => fileURLToPath(new URL(path, import.meta.url));

/** A file of tests/reference/imports. */
export const imported = (name: string): Uint8Array =>
  new Uint8Array(readFileSync(at(`../../reference/imports/${name}`)));

/** Files under other licences stay beside the repository; tests of them are skipped where they are not. */
const OUTSIDE = "../../../../shared/reference/imports/";
export const outsideExists = existsSync(at(OUTSIDE));
export const outside = (name: string): Uint8Array => new Uint8Array(readFileSync(at(OUTSIDE + name)));

export const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text);
export const textOf = (bytes: Uint8Array): string => new TextDecoder().decode(bytes);
