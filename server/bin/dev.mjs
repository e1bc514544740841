// Server with restart on change, and Vite in front of it. One Ctrl-C stops both.
import { spawn } from "node:child_process";
import { bin, ensureInstalled, ensureNode, root } from "./setup.mjs";

ensureNode();
ensureInstalled();
const apiPort = process.env.API_PORT ?? "3001";
const env = { ...process.env, QUILLET_PORT: apiPort, API_PORT: apiPort };
const run = (...args) => spawn(process.execPath, args, { cwd: root, env, stdio: "inherit" });
const children = [
  run(bin("tsx", "dist", "cli.mjs"), "watch", "--clear-screen=false", "server/main.ts"),
  run(bin("vite", "bin", "vite.js"), "--port", process.env.PORT ?? "3000", "--strictPort"),
];
const stop = () => children.forEach((child) => child.kill("SIGTERM"));
process.on("SIGINT", stop);
process.on("SIGTERM", stop);
for (const child of children) {
  child.on("exit", (code) => {
    stop();
    process.exitCode ||= code ?? 0;
  });
}
