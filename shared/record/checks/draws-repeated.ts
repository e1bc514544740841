import { type DrawEntries, drawEntries } from "#shared/draw/draw.ts";
import { Problem } from "#shared/problem.ts";
import type { RecordFile } from "#shared/record/record-file.ts";
import { type Declared, declaredOf } from "./declared.ts";
import type { RebuiltFrame } from "./frame-rebuilt.ts";
import type { RecordEvents } from "./record-events.ts";

/** What a declaration with its seed draws; null where what it rests on is not known, a refusal where it can't be drawn. */
export type Repeated = DrawEntries | Problem | null;

/** Every declaration's list again, by the declaration's id: from frame hash, N, design, seed and generator alone (rule R6). */
export function repeatDraws(
  record: RecordFile,
  events: RecordEvents,
  frames: ReadonlyMap<string, RebuiltFrame>,
  tell: () => void,
): Map<string, Repeated> {
  return new Map(
    declaredOf(record, events).map((declared) => [
      declared.stored.id,
      repeat(declared, frames.get(declared.stored.frameId), tell),
    ]),
  );
}

/** As long as the longest list of the record: a list that ran short was lengthened by the same stream. */
function repeat({ seed, value, draw }: Declared, frame: RebuiltFrame | undefined, tell: () => void): Repeated {
  if (value === null || seed === null || frame === undefined) return null;
  const { sealedSha256, sealedUnits } = frame;
  if (sealedUnits === null) return null;
  const listed = Math.max(0, ...(draw?.lists ?? []).map(({ entries }) => entries.length));
  const reserves = Math.max(value.reserves, listed - value.design.n);
  try {
    return drawEntries(
      { sha256: sealedSha256, units: sealedUnits },
      value.design,
      seed,
      value.generator,
      reserves,
      tell,
    );
  } catch (error) {
    if (error instanceof Problem && error.code !== "cancelled") return error;
    throw error;
  }
}
