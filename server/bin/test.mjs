// npm test: sets everything up, runs every test, and ends with one line that counts the real results.
import { spawnSync } from "node:child_process";
import { existsSync, readFileSync, rmSync } from "node:fs";
import { ensureTestPrograms, findBrowser } from "./needed-programs.mjs";
import { at, bin, ensureBuilt, ensureInstalled, ensureNode, root } from "./setup.mjs";

ensureNode();
ensureInstalled();
ensureTestPrograms();
ensureBuilt();

const results = at("dist", "test-results.json");
rmSync(results, { force: true });
const vitest = spawnSync(
  process.execPath,
  [
    bin("vitest", "vitest.mjs"),
    "run",
    "--reporter=default",
    "--reporter=json",
    `--outputFile.json=${results}`,
    ...process.argv.slice(2),
  ],
  { cwd: root, stdio: "inherit", env: { ...process.env, NODE_ENV: "test", CHROMIUM_PATH: findBrowser() } },
);
const counted = existsSync(results) ? JSON.parse(readFileSync(results, "utf8")) : undefined;
// A runner that died, or a file that could not be loaded, is a failure even where no single test failed.
const died = counted === undefined || (vitest.status !== 0 && counted.numFailedTests === 0);
const passed = counted?.numPassedTests ?? 0;
const failed = (counted?.numFailedTests ?? 0) + (died ? 1 : 0);
const skipped = (counted?.numPendingTests ?? 0) + (counted?.numTodoTests ?? 0);
if (died) console.log("\nThe test runner ended without a clean result: counted as one failure.");
console.log(`\n${passed} passed, ${failed} failed, ${skipped} skipped`);
process.exit(failed > 0 ? 1 : (vitest.status ?? 1));
