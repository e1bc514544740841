import type { RequestHandler } from "express";
import { Problem } from "#shared/problem.ts";

/** Refuses writes that a browser sends from another site: cookies alone would let them pass. */
export const sameOriginOnly: RequestHandler = (req, _res, next) => {
  if (req.method === "GET" || req.method === "HEAD") {
    next();
    return;
  }
  const origin = req.get("origin");
  if (origin !== undefined && !sameHost(origin, req.get("host"))) {
    next(new Problem("cross-origin", "Open Quillet itself and do it there."));
    return;
  }
  next();
};

function sameHost(origin: string, host: string | undefined): boolean {
  try {
    return new URL(origin).host === host;
  } catch {
    return false;
  }
}
