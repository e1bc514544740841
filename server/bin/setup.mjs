// What start, test, dev and the rest do first. Plain Node, no packages: this runs before node_modules exists.
// All talk goes to stderr, so that commands which print results keep stdout to themselves.
import { spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";

export const root = dirname(dirname(dirname(fileURLToPath(import.meta.url))));
export const at = (...parts) => join(root, ...parts);
export const bin = (...parts) => at("node_modules", ...parts);

/** Runs a command to its end with its talk on stderr; the process ends with it when it fails. */
export function run(command, args, options = {}) {
  const result = spawnSync(command, args, { cwd: root, stdio: ["ignore", 2, 2], ...options });
  if (result.error) throw result.error;
  if (result.status !== 0) {
    console.error(`\n${command} ${args.join(" ")} ended with ${result.status ?? result.signal}`);
    process.exit(result.status || 1);
  }
}

export function ensureNode() {
  const [major, minor] = process.versions.node.split(".").map(Number);
  if (major < 20 || (major === 20 && minor < 19)) {
    console.error(`Quillet needs Node 20.19 or newer; this is ${process.version}.`);
    process.exit(1);
  }
}

/** Installs the locked packages when the lock file or Node changed since the last time. */
export function ensureInstalled() {
  const stamp = at("node_modules", ".setup-stamp");
  const hash = hashOf(["package.json", "package-lock.json"]);
  if (isFresh(stamp, hash)) return;
  console.error("Installing packages (first run, or the lock file changed): about three minutes…");
  const npm = process.env.npm_execpath;
  const args = ["ci", "--include=dev", "--no-audit", "--no-fund"];
  if (npm && /\.c?js$/.test(npm)) run(process.execPath, [npm, ...args]);
  else run(process.platform === "win32" ? "npm.cmd" : "npm", args, { shell: process.platform === "win32" });
  mark(stamp, hash);
}

/** Builds client and server when their sources changed since the last time. */
export function ensureBuilt() {
  const stamp = at("dist", ".build-stamp");
  const hash = hashOf([
    "package-lock.json",
    "index.html",
    "vite.config.ts",
    "tsconfig.json",
    "src",
    "server",
    "shared",
    "public",
  ]);
  if (isFresh(stamp, hash)) return;
  console.error("Building…");
  // Whoever builds, a test run too: the pages get React as it is delivered, not the one for development.
  const env = { ...process.env, NODE_ENV: "production" };
  run(process.execPath, [bin("vite", "bin", "vite.js"), "build", "--logLevel", "warn"], { env });
  run(process.execPath, [at("server", "bin", "build-server.mjs")]);
  mark(stamp, hash);
}

function hashOf(paths) {
  const hash = createHash("sha256")
    .update(process.version)
    .update(process.platform + process.arch);
  const walk = (path) => {
    if (!existsSync(path)) return;
    if (statSync(path).isDirectory()) for (const name of readdirSync(path).sort()) walk(join(path, name));
    else hash.update(path.slice(root.length)).update("\0").update(readFileSync(path));
  };
  for (const path of paths) walk(at(path));
  return hash.digest("hex");
}

function isFresh(stamp, hash) {
  return existsSync(stamp) && readFileSync(stamp, "utf8") === hash;
}

function mark(stamp, hash) {
  mkdirSync(dirname(stamp), { recursive: true });
  writeFileSync(stamp, hash);
}
