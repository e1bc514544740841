import type { Request, Response } from "express";
import { getIronSession, type SessionOptions } from "iron-session";
import { deleteSession, findSession, insertSession } from "../db/accounts.ts";
import type { Platform, Visitor } from "../context.ts";

/** The cookie holds only the id of a row in `sessions`: ending a session anywhere is deleting its row. */
interface CookieData {
  sessionId?: string;
}

export interface Sessions {
  /** Who sent this request, or null. */
  visitor(req: Request, res: Response): Promise<Visitor["account"] | null>;
  start(req: Request, res: Response, accountId: string): Promise<void>;
  end(req: Request, res: Response): Promise<void>;
}

const DAYS_14 = 14 * 24 * 3600;

export function openSessions(platform: Platform, options: { secret: string; https: boolean }): Sessions {
  const iron: SessionOptions = {
    cookieName: "quillet",
    password: options.secret,
    ttl: DAYS_14,
    cookieOptions: { httpOnly: true, sameSite: "lax", path: "/", secure: options.https },
  };
  const open = (req: Request, res: Response) => getIronSession<CookieData>(req, res, iron);
  return {
    async visitor(req, res) {
      const { sessionId } = await open(req, res);
      if (sessionId === undefined) return null;
      const found = findSession(platform.db, sessionId, platform.now().toISOString());
      return found ?? null;
    },
    async start(req, res, accountId) {
      const cookie = await open(req, res);
      const now = platform.now();
      const sessionId = Buffer.from(platform.random(24)).toString("base64url");
      insertSession(platform.db, {
        id: sessionId,
        accountId,
        createdAt: now.toISOString(),
        lastSeenAt: now.toISOString(),
        expiresAt: new Date(now.getTime() + DAYS_14 * 1000).toISOString(),
        userAgent: (req.get("user-agent") ?? "").slice(0, 300),
      });
      cookie.sessionId = sessionId;
      await cookie.save();
    },
    async end(req, res) {
      const cookie = await open(req, res);
      if (cookie.sessionId !== undefined) deleteSession(platform.db, cookie.sessionId);
      cookie.destroy();
      await cookie.save();
    },
  };
}
