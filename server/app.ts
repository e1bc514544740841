import { randomUUID } from "node:crypto";
import express, { type Express, type RequestHandler, Router } from "express";
import { rateLimit } from "express-rate-limit";
import helmet from "helmet";
import { pinoHttp } from "pino-http";
import { Problem } from "#shared/problem.ts";
import type { Platform } from "./context.ts";
import { baseMapSources } from "./http/base-map-sources.ts";
import { mountOn } from "./http/mount.ts";
import { sameOriginOnly } from "./http/origin.ts";
import { problems } from "./http/problems.ts";
import { openSessions } from "./http/session.ts";
import { serveClient } from "./http/static.ts";
import { routes } from "./routes/routes.ts";

interface AppOptions {
  readonly sessionSecret: string;
  /** Behind one proxy that speaks HTTPS. */
  readonly https: boolean;
  /** Folder of the built client; null serves the interface only. */
  readonly clientFolder: string | null;
  /** Attempts a minute from one network address to sign in, to accept an invitation, to ask for a link and to use one. */
  readonly signInsPerMinute: number;
}

/**
 * What nobody has to be signed in for and yet takes a password's work or writes a mail: a cap a minute for each, whoever is
 * meant, so that a flood can't keep the processor busy. How often a password may be wrong is services/expect-attempt.ts.
 */
const COSTLY = [
  "/api/session",
  "/api/invitations/:secret",
  "/api/password-resets",
  "/api/password-resets/:secret",
] as const;

/** The end of a link in a mail lets somebody in: whoever reads the log must not find it. */
function withoutLinkSecret<T extends { readonly url: string }>(req: T): T {
  return { ...req, url: req.url.replace(/\/(invitations?|password-resets|reset)\/.*/i, "/$1/…") };
}

function limiter(limit: number): RequestHandler {
  return rateLimit({
    windowMs: 60_000,
    limit,
    standardHeaders: true,
    legacyHeaders: false,
    handler: (_req, _res, next) => next(new Problem("too-many-requests", "Wait a minute, then try again.")),
  });
}

/** Builds the app without listening, so that a test can drive it over a port of its own. */
export function createApp(platform: Platform, options: AppOptions): Express {
  const app = express();
  app.disable("x-powered-by");
  // Behind exactly one proxy the address of a person is the one that the proxy saw; else a header can't be believed.
  if (options.https) app.set("trust proxy", 1);
  app.use(
    helmet({
      // Quillet is often reached over plain HTTP on a local network: nothing may insist on HTTPS there.
      contentSecurityPolicy: {
        directives: {
          "default-src": ["'self'"],
          "img-src": ["'self'", "data:", "blob:", () => baseMapSources(platform.db)],
          "style-src": ["'self'", "'unsafe-inline'"],
          "worker-src": ["'self'", "blob:"],
          "upgrade-insecure-requests": null,
        },
      },
      strictTransportSecurity: options.https,
      crossOriginOpenerPolicy: options.https,
      originAgentCluster: options.https,
      referrerPolicy: { policy: "strict-origin-when-cross-origin" },
    }),
  );
  app.use(
    pinoHttp({
      logger: platform.log,
      genReqId: () => randomUUID(),
      redact: ["req.headers.cookie", "req.headers.authorization", 'res.headers["set-cookie"]', "req.params.secret"],
      serializers: { req: withoutLinkSecret },
    }),
  );
  app.use(sameOriginOnly);
  for (const path of COSTLY) app.post(path, limiter(options.signInsPerMinute));
  const api = Router();
  const sessions = openSessions(platform, { secret: options.sessionSecret, https: options.https });
  routes(mountOn(api, platform, sessions));
  app.use(api);
  app.use("/api", (_req, _res, next) => {
    next(new Problem("not-found", "See /api/openapi.json for what there is."));
  });
  if (options.clientFolder !== null) serveClient(app, options.clientFolder);
  app.use(problems(platform.log));
  return app;
}
