import { Readable } from "node:stream";
import { pipeline } from "node:stream/promises";
import type { Response } from "express";
import * as z from "zod/mini";
import type { Answer } from "#shared/api/contract.ts";

/** Bytes to send: whole, or piece by piece with back-pressure. */
export interface FileAnswer {
  readonly type: string;
  /** Offered for saving under this name where given. */
  readonly fileName?: string;
  readonly body: string | Uint8Array | Iterable<Uint8Array> | AsyncIterable<Uint8Array>;
  readonly immutable?: boolean;
}

export async function send(res: Response, answer: Answer, result: unknown): Promise<void> {
  res.setHeader("Cache-Control", "no-store");
  if (answer.kind === "json") {
    res.json(z.parse(answer.schema, result));
    return;
  }
  const file = result as FileAnswer;
  if (!answer.types.includes(file.type)) throw new Error(`an answer of type ${file.type} is not in the contract`);
  if (file.immutable === true) res.setHeader("Cache-Control", "private, max-age=31536000, immutable");
  res.type(file.type.startsWith("text/") ? `${file.type}; charset=utf-8` : file.type);
  if (file.fileName !== undefined) res.attachment(file.fileName).type(file.type);
  if (typeof file.body === "string") {
    res.send(file.body);
  } else if (file.body instanceof Uint8Array) {
    res.send(Buffer.from(file.body.buffer, file.body.byteOffset, file.body.byteLength));
  } else {
    await pipeline(Readable.from(file.body), res);
  }
}
