import { existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import express, { type Express } from "express";

/** The built client: hashed assets for ever, the shell for every other address that a browser may be reloaded at. */
export function serveClient(app: Express, folder: string): void {
  if (!existsSync(join(folder, "index.html"))) return;
  const shell = readFileSync(join(folder, "index.html"), "utf8");
  app.use(
    "/assets",
    express.static(join(folder, "assets"), { immutable: true, maxAge: "1y", fallthrough: false, index: false }),
  );
  app.use(express.static(folder, { index: false, setHeaders: (res) => res.setHeader("Cache-Control", "no-cache") }));
  app.get("/{*path}", (_req, res) => {
    res.set("Cache-Control", "no-cache").type("html").send(shell);
  });
}
