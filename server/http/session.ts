import type { Request, Response } from "express";
import { getIronSession, type SessionOptions } from "iron-session";
import { Problem } from "#shared/problem.ts";
import type { Platform, Visitor } from "../context.ts";
import { type AccountRow, findAccount } from "../db/accounts.ts";
import { writeTx } from "../db/open.ts";
import { deleteSession, findSession, insertSession, setLastSeen } from "../db/sessions.ts";

/** The cookie holds only the id of a row in `sessions`: ending a session anywhere is deleting its row. */
interface CookieData {
  sessionId?: string;
}

/** An account as it was when its password was proven. */
export type Proven = Pick<AccountRow, "id" | "passwordHash">;

export interface Sessions {
  /** Who sent this request, or null. */
  visitor(req: Request, res: Response): Promise<Visitor["account"] | null>;
  /** The id of the session that this request came with; throws where it came with none. */
  id(req: Request, res: Response): Promise<string>;
  /**
   * Starts a session; the one that the cookie named before ends.
   * @throws Problem `sign-in-refused` where the account was closed or its password changed since it was proven
   */
  start(req: Request, res: Response, proven: Proven): Promise<void>;
  end(req: Request, res: Response): Promise<void>;
}

/** How exactly it is kept when a session was last used: a write a request would be too much. */
const SEEN_EVERY_MS = 60_000;

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
      const now = platform.now();
      const found = findSession(platform.db, sessionId, now.toISOString());
      if (!found) return null;
      const { lastSeenAt, ...account } = found;
      if (now.getTime() - Date.parse(lastSeenAt) >= SEEN_EVERY_MS) {
        setLastSeen(platform.db, sessionId, now.toISOString());
      }
      return account;
    },
    async id(req, res) {
      const { sessionId } = await open(req, res);
      if (sessionId === undefined) throw new Error("the request came with no session");
      return sessionId;
    },
    async start(req, res, proven) {
      const cookie = await open(req, res);
      const before = cookie.sessionId;
      const now = platform.now();
      const sessionId = Buffer.from(platform.random(24)).toString("base64url");
      writeTx(platform.db, (tx) => {
        const account = findAccount(tx, proven.id);
        if (!account || account.closedAt !== null || account.passwordHash !== proven.passwordHash) {
          throw new Problem("sign-in-refused", "The account was changed meanwhile. Try again.");
        }
        if (before !== undefined) deleteSession(tx, before);
        insertSession(tx, {
          id: sessionId,
          accountId: account.id,
          createdAt: now.toISOString(),
          lastSeenAt: now.toISOString(),
          expiresAt: new Date(now.getTime() + DAYS_14 * 1000).toISOString(),
          userAgent: (req.get("user-agent") ?? "").slice(0, 300),
        });
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
