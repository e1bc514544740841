// Programs that the tests use and npm does not bring. Installed from Debian where that can be done, else named plainly.
import { existsSync } from "node:fs";
import { spawnSync } from "node:child_process";
import { run } from "./setup.mjs";

const BROWSERS = [
  process.env.CHROMIUM_PATH,
  "/usr/bin/chromium",
  "/usr/bin/chromium-browser",
  "/usr/bin/google-chrome",
  "/Applications/Google Chrome.app/Contents/MacOS/Google Chrome",
  "C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe",
];

const PROGRAMS = [
  {
    what: "Chromium or Chrome",
    why: "the browser tests",
    debian: "chromium",
    found: () => findBrowser() !== undefined,
  },
  {
    what: "xmllint",
    why: "checking GPX files against the schema",
    debian: "libxml2-utils",
    found: () => answers("xmllint"),
  },
  { what: "python3", why: "repeating a draw outside Quillet", debian: "python3", found: () => answers("python3") },
];

export function findBrowser() {
  return BROWSERS.find((path) => path && existsSync(path));
}

/** Installs what lacks (root on Debian), or says what to install and ends the process. */
export function ensureTestPrograms() {
  const missing = PROGRAMS.filter((program) => !program.found());
  if (missing.length === 0) return;
  const canInstall = process.platform === "linux" && process.getuid?.() === 0 && existsSync("/usr/bin/apt-get");
  if (canInstall) {
    console.error(`Installing ${missing.map((program) => program.debian).join(", ")}…`);
    run("apt-get", ["update", "-qq"]);
    const env = { ...process.env, DEBIAN_FRONTEND: "noninteractive" };
    run("apt-get", ["install", "-y", "-qq", "--no-install-recommends", ...missing.map((p) => p.debian)], { env });
  }
  const still = PROGRAMS.filter((program) => !program.found());
  if (still.length === 0) return;
  for (const { what, why, debian } of still) {
    console.error(
      `${what} is not on this computer: ${why} need it. On Debian or Ubuntu: sudo apt-get install ${debian}`,
    );
  }
  console.error("A browser elsewhere can be named in CHROMIUM_PATH.");
  process.exit(1);
}

function answers(command) {
  return spawnSync(command, ["--version"], { stdio: "ignore" }).error === undefined;
}
