import { createHash } from "node:crypto";
import { Problem } from "#shared/problem.ts";
import type { Platform } from "../context.ts";

/** The secret end of a link in a mail, and its SHA-256 in hexadecimal, which is all that is kept of it. */
export function newLink(platform: Pick<Platform, "random">): { secret: string; secretSha256: string } {
  const secret = Buffer.from(platform.random(32)).toString("base64url");
  return { secret, secretSha256: linkSha256(secret) };
}

export function linkSha256(secret: string): string {
  return createHash("sha256").update(secret).digest("hex");
}

/** A moment as mails write it: "2031-05-16 08:00 UTC". */
export function utcWords(at: string): string {
  return `${at.slice(0, 16).replace("T", " ")} UTC`;
}

/** Why a link does not work; alike for links that were used, withdrawn, replaced or have expired, and for those that never were. */
export function linkEnded(what: "invitation" | "reset"): Problem {
  return new Problem(
    "link-ended",
    what === "invitation"
      ? "It was used, withdrawn or replaced by a newer one, or it has expired. Ask whoever invited you for a new one."
      : "It was used or replaced by a newer one, or it has expired. Ask for a new one on the page for signing in.",
  );
}
