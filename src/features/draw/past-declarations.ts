import type { Declaration } from "#shared/api/draw.ts";
import type { EarlierDeclaration } from "#shared/draw/seed-used-before.ts";
import type { useDraws } from "./queries.ts";

export type Draws = NonNullable<ReturnType<typeof useDraws>["data"]>;

/** A declaration that ended, with the draw that was made from it. */
export interface PastDeclaration {
  readonly declaration: Declaration;
  readonly draw: Draws["draws"][number] | null;
}

/** Every declaration that is neither open nor of the draw in use: newest first. */
export function pastDeclarations(draws: Draws): PastDeclaration[] {
  return draws.declarations
    .filter(({ state, drawId }) => state !== "open" && (drawId === null || drawId !== draws.liveDrawId))
    .map((declaration) => ({ declaration, draw: draws.draws.find(({ id }) => id === declaration.drawId) ?? null }));
}

/** "Draw 2", or "Declaration" where none was drawn from it. */
export function pastName({ draw }: PastDeclaration): string {
  return draw === null ? "Declaration" : `Draw ${draw.number}`;
}

/** Where the history shows it, for links to it. */
export function pastAnchor({ declaration }: PastDeclaration): string {
  return `declaration-${declaration.id}`;
}

/** What matters of it for a seed that is typed again. */
export function asEarlier(past: PastDeclaration): EarlierDeclaration & PastDeclaration {
  const { frameSha256, generator, seed } = past.declaration;
  return { ...past, frameSha256, generator, seed: seed?.text ?? null, drawNumber: past.draw?.number ?? null };
}
