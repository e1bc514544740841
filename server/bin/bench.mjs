// npm run bench: measures Quillet beside general libraries in one run and prints ratios.
import { bin, ensureInstalled, ensureNode, root } from "./setup.mjs";
import { spawnSync } from "node:child_process";

ensureNode();
ensureInstalled();
const { status } = spawnSync(
  process.execPath,
  [bin("tsx", "dist", "cli.mjs"), "tests/bench/run.ts", ...process.argv.slice(2)],
  {
    cwd: root,
    stdio: "inherit",
  },
);
process.exit(status ?? 1);
