import type { Request, RequestHandler, Response, Router } from "express";
import express from "express";
import multer, { MulterError } from "multer";
import type * as z from "zod/mini";
import { ownerMay, reach } from "#shared/access/table.ts";
import type { Answer, Contract } from "#shared/api/contract.ts";
import { Problem } from "#shared/problem.ts";
import type { Context, Platform, Visitor } from "../context.ts";
import { isOwnedParam, surveyOf } from "../db/belongs.ts";
import { standingOf } from "../db/members.ts";
import { expectInWork } from "../db/surveys.ts";
import { parse } from "./parse.ts";
import { type FileAnswer, send } from "./send.ts";
import type { Proven, Sessions } from "./session.ts";
import { seenVersion, versionOf } from "./version.ts";

type Schema = z.core.$ZodType;

export interface UploadedFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

interface Input<P extends Schema, Q extends Schema, B extends Schema> {
  readonly params: z.output<P>;
  readonly query: z.output<Q>;
  readonly body: z.output<B>;
  /** Present for contracts with an upload. */
  readonly file: UploadedFile;
  /** Starts and ends the session of this request, and says which it came with. */
  readonly session: { id(): Promise<string>; start(proven: Proven): Promise<void>; end(): Promise<void> };
  /** Network address of whoever asks. */
  readonly source: string;
  /** Aborts when the caller has gone. */
  readonly signal: AbortSignal;
  /** For versioned contracts: refuses unless this is the version that the caller saw. To be called inside the transaction. */
  readonly expectSeen: (current: unknown) => void;
}

type Returned<A extends Answer> = A extends { kind: "json"; schema: infer R extends Schema } ? z.input<R> : FileAnswer;

type Handler<C, P extends Schema, Q extends Schema, B extends Schema, A extends Answer> = (
  ctx: C,
  input: Input<P, Q, B>,
) => Returned<A> | Promise<Returned<A>>;

export interface Mount {
  /** Anybody may call it. */
  open<P extends Schema, Q extends Schema, B extends Schema, A extends Answer>(
    contract: Contract<P, Q, B, A>,
    handler: Handler<Platform & { account: Visitor["account"] | null }, P, Q, B, A>,
  ): void;
  /** Somebody signed in, or the owner, as the contract says. */
  signedIn<P extends Schema, Q extends Schema, B extends Schema, A extends Answer>(
    contract: Contract<P, Q, B, A>,
    handler: Handler<Visitor, P, Q, B, A>,
  ): void;
  /** A member of the survey whose roles allow the contract's action. */
  survey<P extends Schema, Q extends Schema, B extends Schema, A extends Answer>(
    contract: Contract<P, Q, B, A>,
    handler: Handler<Context, P, Q, B, A>,
  ): void;
}

const jsonBody = express.json({ limit: "4mb" });

/**
 * Turns contracts and handlers into routes: path parsed, guard checked, every further id of the path held against the
 * survey, and only then is the body read; the answer is parsed too, so that a column added by accident can't leave.
 */
export function mountOn(router: Router, platform: Platform, sessions: Sessions): Mount {
  const add = (contract: Contract, guard: (req: Request, res: Response) => Promise<unknown>, handler: unknown) => {
    const upload = contract.upload ? fileReader(contract.upload) : undefined;
    const verb = contract.method.toLowerCase() as "get" | "post" | "put" | "delete";
    for (const name of contract.path.match(/:(\w+)/g) ?? [])
      if (contract.path.includes(":surveyId")) isOwnedParam(name.slice(1));
    router[verb](contract.path, async (req, res) => {
      const params = parse(contract.params, req.params, "path");
      const ctx = await guard(req, res);
      const query = parse(contract.query, req.query, "query");
      await run(upload ?? jsonBody, req, res);
      const body = parse(contract.body, upload ? bodyField(req) : (req.body ?? {}), "body");
      const file = upload ? uploaded(req) : undefined;
      const gone = new AbortController();
      res.on("close", () => gone.abort());
      const session = {
        id: () => sessions.id(req, res),
        start: (proven: Proven) => sessions.start(req, res, proven),
        end: () => sessions.end(req, res),
      };
      const expectSeen = seenVersion(contract, req);
      const source = req.ip ?? "unknown";
      const input = { params, query, body, file, session, source, signal: gone.signal, expectSeen };
      const result = await (handler as (ctx: unknown, input: unknown) => unknown)(ctx, input);
      if (contract.versioned === true) res.setHeader("ETag", versionOf(contract.answer, result));
      await send(res, contract.answer, result);
    });
  };
  return {
    open(contract, handler) {
      expectGuard(contract, contract.guard === "public");
      add(contract, async (req, res) => ({ ...platform, account: await sessions.visitor(req, res) }), handler);
    },
    signedIn(contract, handler) {
      expectGuard(contract, contract.guard === "signed-in" || contract.guard === "owner");
      add(contract, (req, res) => visitorFor(contract, platform, sessions, req, res), handler);
    },
    survey(contract, handler) {
      expectGuard(contract, contract.path.startsWith("/api/surveys/:surveyId"));
      add(contract, (req, res) => memberFor(contract, platform, sessions, req, res), handler);
    },
  };
}

function expectGuard(contract: Contract, fits: boolean): void {
  if (!fits) throw new Error(`${contract.name} is guarded by ${contract.guard} and can't be mounted here`);
}

async function visitorFor(contract: Contract, platform: Platform, sessions: Sessions, req: Request, res: Response) {
  const account = await sessions.visitor(req, res);
  if (!account) throw new Problem("not-signed-in", "Sign in, then try again.");
  if (contract.guard === "owner" && !account.isOwner) {
    throw new Problem("not-allowed", "Only an owner of this installation can do this.");
  }
  return { ...platform, account } satisfies Visitor;
}

async function memberFor(contract: Contract, platform: Platform, sessions: Sessions, req: Request, res: Response) {
  const visitor = await visitorFor(contract, platform, sessions, req, res);
  const { guard } = contract;
  if (guard === "public" || guard === "signed-in" || guard === "owner") throw new Error(`${contract.name}: ${guard}`);
  const surveyId = String(req.params["surveyId"]);
  const { memberId, roles } = standingOf(platform.db, surveyId, visitor.account.id);
  const asOwner = visitor.account.isOwner && ownerMay(guard);
  if (roles.length === 0 && !asOwner) {
    throw new Problem("survey-not-found", "Check the address, or ask a planner of the survey to add you.");
  }
  const reached = asOwner ? "all" : reach(roles, guard);
  if (reached === "none") {
    throw new Problem("not-allowed", `As ${roles.join(" and ")} of this survey you can't do this: ask a planner.`);
  }
  if (contract.method !== "GET" && contract.whenArchived !== true) expectInWork(platform.db, surveyId);
  for (const [name, value] of Object.entries(req.params)) {
    if (isOwnedParam(name) && surveyOf(platform.db, name, String(value)) !== surveyId) {
      throw new Problem("not-found", "It may belong to another survey: go back to the survey and choose again.");
    }
  }
  return { ...visitor, surveyId, memberId, roles, reach: reached } satisfies Context;
}

function fileReader(upload: { field: string; maxBytes: number }): RequestHandler {
  const limits = { fileSize: upload.maxBytes, files: 1, fields: 1, fieldSize: 1_000_000 };
  const read = multer({ storage: multer.memoryStorage(), limits, defParamCharset: "utf8" }).single(upload.field);
  return (req, res, next) => {
    void read(req, res, (error?: unknown) => next(error === undefined ? undefined : unreadable(error)));
  };
}

/** What is no upload, or breaks off on the way, is the sender's mistake and not ours: the parser throws plain errors. */
function unreadable(error: unknown): unknown {
  if (error instanceof MulterError) return error;
  return new Problem("input-invalid", "The upload breaks off or is no multipart form. Send the file again.");
}

/** The body of an upload travels as JSON text in the field "body", before the file. */
function bodyField(req: Request): unknown {
  const text = (req.body as { body?: unknown } | undefined)?.body;
  if (typeof text !== "string") return {};
  try {
    return JSON.parse(text);
  } catch {
    throw new Problem("input-invalid", "The field “body” is not JSON.");
  }
}

function uploaded(req: Request): UploadedFile {
  if (!req.file) throw new Problem("input-invalid", "No file came with the request. Choose one and send it again.");
  return { name: req.file.originalname, bytes: req.file.buffer };
}

function run(middleware: RequestHandler, req: Request, res: Response): Promise<void> {
  return new Promise((resolve, reject) => {
    void middleware(req, res, (error?: unknown) => {
      if (error === undefined) resolve();
      else reject(error instanceof Error ? error : new Error(`a middleware failed: ${JSON.stringify(error)}`));
    });
  });
}
