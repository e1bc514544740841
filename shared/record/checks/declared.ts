import type { Declaration } from "#shared/draw/declaration.ts";
import { declaration as declarationSchema } from "#shared/draw/declaration.ts";
import type { RecordFile } from "#shared/record/record-file.ts";

export type StoredDeclaration = RecordFile["declarations"][number];
export type StoredDraw = RecordFile["draws"][number];

/** A declaration of the record with what became of it. */
export interface Declared {
  /** From 1, in the order of the list. */
  readonly number: number;
  readonly stored: StoredDeclaration;
  /** Null where it is not a declaration of a known format. */
  readonly value: Declaration | null;
  readonly draw: StoredDraw | null;
  /** "draw 2", or "declaration 3" where it never became a draw. */
  readonly name: string;
}

export function declaredOf(record: RecordFile): Declared[] {
  const draws = new Map(record.draws.map((draw) => [draw.declarationId, draw]));
  return record.declarations.map((stored, place) => {
    const draw = draws.get(stored.id) ?? null;
    const value = declarationSchema.safeParse(stored.declaration);
    return {
      number: place + 1,
      stored,
      value: value.success ? value.data : null,
      draw,
      name: draw === null ? `declaration ${place + 1}` : `draw ${draw.number}`,
    };
  });
}

export function nameOf(record: RecordFile, member: string): string {
  return record.people.find((person) => person.member === member)?.name ?? `member ${member}`;
}
