import { createHash } from "node:crypto";
import type { Request } from "express";
import * as z from "zod/mini";
import type { Answer, Contract } from "#shared/api/contract.ts";
import { Problem } from "#shared/problem.ts";

/** The ETag of an answer (RFC 9110): a hash of what is sent, so that nothing has to count versions. */
export function versionOf(answer: Answer, value: unknown): string {
  if (answer.kind !== "json") throw new Error("only JSON answers have versions");
  const text = JSON.stringify(z.parse(answer.schema, value));
  return `"${createHash("sha256").update(text).digest("base64url").slice(0, 22)}"`;
}

/**
 * The check that a write was made on the version that its sender saw (If-Match); the refusal carries the current one, so
 * that both can be shown.
 * @throws Problem `version-missing` for a versioned write without the header
 */
export function seenVersion(contract: Contract, req: Request): (current: unknown) => void {
  if (contract.versioned !== true || contract.method === "GET") {
    return () => {
      throw new Error(`${contract.name} has no versions`);
    };
  }
  const seen = req.get("if-match");
  if (seen === undefined) {
    throw new Problem("version-missing", "Read it first, then send the ETag of what you saw as If-Match.");
  }
  return (current) => {
    const version = versionOf(contract.answer, current);
    if (version === seen) return;
    throw new Problem("changed-meanwhile", "Look at both versions, then say what is to stand.", {
      kind: "versions",
      current,
      version,
    });
  };
}
