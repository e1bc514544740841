// Bundles the server, its worker and the quillet command into dist/server; packages stay outside.
import { rmSync } from "node:fs";
import { build } from "esbuild";

rmSync("dist/server", { recursive: true, force: true }); // chunks of earlier builds have other names and would stay

await build({
  entryPoints: { main: "server/main.ts", quillet: "server/cli/quillet.ts", "jobs/worker": "server/jobs/worker.ts" },
  outdir: "dist/server",
  bundle: true,
  splitting: true, // so that a command or the demo is loaded when it is asked for
  packages: "external",
  platform: "node",
  format: "esm",
  target: "node20",
  sourcemap: true,
  logLevel: "warning",
});
