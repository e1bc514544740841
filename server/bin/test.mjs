// npm test: sets everything up, runs every test, and ends with one line that counts the real results.
import { spawnSync } from "node:child_process";
import { existsSync, readFileSync, rmSync } from "node:fs";
import { ensureTestPrograms, findBrowser } from "./needed-programs.mjs";
import { at, bin, ensureBuilt, ensureInstalled, ensureNode, root } from "./setup.mjs";

ensureNode();
ensureInstalled();
ensureTestPrograms();
ensureBuilt();

// Browser tests measure times, so they run alone, after everything else.
const asked = process.argv.slice(2);
const phases =
  asked.length > 0 ? [asked] : [["--project=shared", "--project=server", "--project=src"], ["--project=e2e"]];
const totals = { passed: 0, failed: 0, skipped: 0 };
for (const [index, phase] of phases.entries())
  addTo(totals, runVitest(phase, at("dist", `test-results-${index}.json`)));
console.log(`\n${totals.passed} passed, ${totals.failed} failed, ${totals.skipped} skipped`);
process.exit(totals.failed > 0 ? 1 : 0);

/** Runs Vitest and counts from its own report; a runner that died, or a file that could not be loaded, is one failure more. */
function runVitest(args, report) {
  rmSync(report, { force: true });
  const { status } = spawnSync(
    process.execPath,
    [
      bin("vitest", "vitest.mjs"),
      "run",
      "--reporter=default",
      "--reporter=json",
      `--outputFile.json=${report}`,
      ...args,
    ],
    { cwd: root, stdio: "inherit", env: { ...process.env, NODE_ENV: "test", CHROMIUM_PATH: findBrowser() } },
  );
  const counted = existsSync(report) ? JSON.parse(readFileSync(report, "utf8")) : undefined;
  const failed = counted?.numFailedTests ?? 0;
  const died = counted === undefined || (status !== 0 && failed === 0);
  if (died) console.log("\nThe test runner ended without a clean result: counted as one failure.");
  return {
    passed: counted?.numPassedTests ?? 0,
    failed: failed + (died ? 1 : 0),
    skipped: (counted?.numPendingTests ?? 0) + (counted?.numTodoTests ?? 0),
  };
}

function addTo(sum, part) {
  for (const name of Object.keys(sum)) sum[name] += part[name];
}
