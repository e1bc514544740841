// npm run check: types, lint, unused code, format, and the size of the first page. No tests.
import { spawnSync } from "node:child_process";
import { readdirSync, readFileSync } from "node:fs";
import { gzipSync } from "node:zlib";
import { at, bin, ensureBuilt, ensureInstalled, ensureNode, root } from "./setup.mjs";

ensureNode();
ensureInstalled();
const steps = [
  ["types", [bin("typescript", "bin", "tsc"), "-b"]],
  ["lint", ["--max-old-space-size=4096", bin("eslint", "bin", "eslint.js"), ".", "--max-warnings=0"]],
  ["unused", [bin("knip", "bin", "knip.js")]],
  ["format", [bin("prettier", "bin", "prettier.cjs"), "--check", "--log-level", "warn", "."]],
];
let failed = 0;
for (const [name, args] of steps) {
  const { status } = spawnSync(process.execPath, args, { cwd: root, stdio: "inherit" });
  console.log(`${name}: ${status === 0 ? "clean" : "FAILED"}`);
  if (status !== 0) failed += 1;
}

/** Scripts and styles that the shell names are what a first visit waits for. */
const FIRST_PAGE_KIB = 260;
ensureBuilt();
const shell = readFileSync(at("dist", "client", "index.html"), "utf8");
const first = readdirSync(at("dist", "client", "assets")).filter((name) => shell.includes(`/assets/${name}`));
const bytes = first.reduce((sum, name) => sum + gzipSync(readFileSync(at("dist", "client", "assets", name))).length, 0);
const kib = bytes / 1024;
console.log(`first page: ${kib.toFixed(0)} KiB gzipped, at most ${FIRST_PAGE_KIB}`);
if (kib > FIRST_PAGE_KIB) failed += 1;
process.exit(failed > 0 ? 1 : 0);
