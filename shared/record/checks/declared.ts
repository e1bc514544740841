import type { Declaration } from "#shared/draw/declaration.ts";
import { declaration as declarationSchema } from "#shared/draw/declaration.ts";
import { canonicalSha256 } from "#shared/record/chain.ts";
import type { RecordFile } from "#shared/record/record-file.ts";
import type { RecordEvents } from "./record-events.ts";

export type StoredDeclaration = RecordFile["declarations"][number];
export type StoredDraw = RecordFile["draws"][number];

/** A declaration of the record with what became of it. */
export interface Declared {
  /** From 1, in the order of the list. */
  readonly number: number;
  readonly stored: StoredDeclaration;
  /** Null where it is not the declaration that its event sealed, or of no known format. */
  readonly value: Declaration | null;
  readonly draw: StoredDraw | null;
  /** As its event gave it; as the list has it where that event is not whole. Null where there is none. */
  readonly seed: string | null;
  /** "draw 2", or "declaration 3" where it never became a draw. */
  readonly name: string;
}

export function declaredOf(record: RecordFile, events: RecordEvents): Declared[] {
  const draws = new Map(record.draws.map((draw) => [draw.declarationId, draw]));
  const sealed = new Map(events.of("draw-declared").map(({ payload }) => [payload.declarationId, payload]));
  const seeds = new Map(events.of("seed-given").map(({ payload }) => [payload.declarationId, payload.seed]));
  return record.declarations.map((stored, place) => {
    const draw = draws.get(stored.id) ?? null;
    const hash = sealed.get(stored.id)?.declarationSha256 ?? stored.sha256;
    const value = declarationSchema.safeParse(stored.declaration);
    return {
      number: place + 1,
      stored,
      value: value.success && canonicalSha256(stored.declaration) === hash ? value.data : null,
      draw,
      seed: seeds.get(stored.id) ?? stored.seed?.text ?? null,
      name: draw === null ? `declaration ${place + 1}` : `draw ${draw.number}`,
    };
  });
}

export function nameOf(record: RecordFile, member: string): string {
  return record.people.find((person) => person.member === member)?.name ?? `member ${member}`;
}
