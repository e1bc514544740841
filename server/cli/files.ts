import { readFileSync, writeFileSync } from "node:fs";
import { Problem } from "#shared/problem.ts";

/** @throws Problem `not-found` or `input-invalid` that names the file. */
export function readBytes(path: string): Uint8Array {
  try {
    return readFileSync(path);
  } catch (error) {
    throw fileProblem(path, error, "read");
  }
}

export function readText(path: string): string {
  return new TextDecoder().decode(readBytes(path));
}

export function writeFile(path: string, content: string | Uint8Array): void {
  try {
    writeFileSync(path, content);
  } catch (error) {
    throw fileProblem(path, error, "written");
  }
}

function fileProblem(path: string, error: unknown, what: string): Problem {
  const code = error instanceof Error && "code" in error ? String(error.code) : "";
  if (code === "ENOENT") return new Problem("not-found", `There is no file ${path}. Check its name.`);
  if (code === "") throw error;
  return new Problem("input-invalid", `${path} cannot be ${what} (${code}). Choose another file.`);
}
