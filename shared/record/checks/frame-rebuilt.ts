import type { FrameCells } from "#shared/frame/cells.ts";
import { type FrameStatement, parseStatement, rebuildCells } from "#shared/frame/statement.ts";
import { Problem } from "#shared/problem.ts";
import { canonicalSha256 } from "#shared/record/chain.ts";
import type { RecordFile } from "#shared/record/record-file.ts";
import type { RecordEvents } from "./record-events.ts";

/** A frame of the record, made again from its rings and cell spec alone. */
export interface RebuiltFrame {
  readonly stored: RecordFile["frames"][number];
  /** What its event sealed; the statement's own where that event is missing or not whole. */
  readonly sealedSha256: string;
  readonly sealedListSha256: string | null;
  readonly sealedUnits: number | null;
  /** Of the statement as it stands in the record. */
  readonly statementSha256: string;
  /** Null where it is no statement of a known format. */
  readonly statement: FrameStatement | null;
  /** The statement is the one that was sealed. */
  readonly isTheSealed: boolean;
  /** Null where the statement is not the sealed one, or its cells cannot be made. */
  readonly cells: FrameCells | null;
  /** Why the statement or its cells could not be made. */
  readonly refusal: string | null;
}

export function rebuildFrames(record: RecordFile, events: RecordEvents, tell: () => void): Map<string, RebuiltFrame> {
  return new Map(
    record.frames.map((stored) => {
      tell();
      return [stored.id, rebuildFrame(stored, events, tell)];
    }),
  );
}

function rebuildFrame(stored: RecordFile["frames"][number], events: RecordEvents, tell: () => void): RebuiltFrame {
  const event = events.of("frame-sealed").find(({ payload }) => payload.frameId === stored.id)?.payload;
  const statementSha256 = canonicalSha256(stored.statement);
  const sealedSha256 = event?.frameSha256 ?? statementSha256;
  const isTheSealed = sealedSha256 === statementSha256;
  const made = isTheSealed ? makeAgain(stored.statement, tell) : { statement: null, cells: null, refusal: null };
  return {
    stored,
    sealedSha256,
    sealedListSha256: event?.listSha256 ?? made.statement?.listSha256 ?? null,
    sealedUnits: event?.units ?? made.statement?.units ?? null,
    statementSha256,
    isTheSealed,
    ...made,
  };
}

function makeAgain(value: unknown, tell: () => void): Pick<RebuiltFrame, "statement" | "cells" | "refusal"> {
  let statement: FrameStatement | null = null;
  try {
    statement = parseStatement(JSON.stringify(value));
    return { statement, cells: rebuildCells(statement, tell), refusal: null };
  } catch (error) {
    if ((error instanceof Problem && error.code !== "cancelled") || error instanceof RangeError) {
      return { statement, cells: null, refusal: error.message };
    }
    throw error;
  }
}
