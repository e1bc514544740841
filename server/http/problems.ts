import type { ErrorRequestHandler } from "express";
import { MulterError } from "multer";
import type { Logger } from "pino";
import { Problem, PROBLEMS } from "#shared/problem.ts";

/** The last handler: refusals become problem+json (RFC 9457); anything else is our bug, logged whole and told in brief. */
export function problems(log: Logger): ErrorRequestHandler {
  return (error: unknown, req, res, next) => {
    const problem = asProblem(error);
    if (problem === undefined) log.error({ err: error, method: req.method, path: req.path }, "unexpected error");
    if (res.headersSent) {
      next(error);
      return;
    }
    const told =
      problem ??
      new Problem(
        "internal",
        "Nothing was changed by this request. Try again; if it happens again, tell the owner when.",
      );
    res.status(told.status).type("application/problem+json");
    res.json({
      type: `about:blank#${told.code}`,
      title: told.title,
      status: told.status,
      detail: told.message,
      code: told.code,
      ...(told.question ? { question: told.question } : {}),
    });
  };
}

function asProblem(error: unknown): Problem | undefined {
  if (error instanceof Problem) return error;
  if (error instanceof MulterError) {
    if (error.code === "LIMIT_FILE_SIZE") return new Problem("too-large", "Choose a smaller file.");
    return new Problem("input-invalid", `The upload cannot be read: ${error.message}.`);
  }
  const { type, status } = (error ?? {}) as { type?: unknown; status?: unknown };
  if (type === "entity.too.large") return new Problem("too-large", "Send less at once.");
  if (status === PROBLEMS["not-found"].status) return new Problem("not-found", "Reload the page.");
  if (typeof status === "number" && status >= 400 && status < 500) {
    return new Problem("input-invalid", "The request cannot be read as JSON.");
  }
  return undefined;
}
