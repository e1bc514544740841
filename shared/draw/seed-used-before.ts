import type { GeneratorName } from "./generator.ts";
import { checkSeed } from "./seed.ts";

/** A declaration made before in the survey, whatever became of it. */
export interface EarlierDeclaration {
  readonly frameSha256: string;
  readonly generator: GeneratorName;
  /** As it is stored; null where none was made or it is not told. */
  readonly seed: string | null;
  /** The number of the draw that was made from it; null where it was abandoned. */
  readonly drawNumber: number | null;
}

/**
 * The earlier declarations that had the same seed on the same frame with the same generator, in the order given. These three
 * make the stream (rule R6), so the cells come out the same and in the same order: a longer or shorter list of them, and
 * without replacement the repeats are left out. Such a seed is no new chance; it is told, never refused.
 * @param typed the seed as it is being typed; compared in the form in which it would be stored
 * @throws Problem `seed-invalid` as checkSeed does.
 */
export function seedUsedBefore<Earlier extends EarlierDeclaration>(
  earlier: readonly Earlier[],
  frameSha256: string,
  generator: GeneratorName,
  typed: string,
): Earlier[] {
  const seed = checkSeed(typed);
  return earlier.filter((one) => one.seed === seed && one.frameSha256 === frameSha256 && one.generator === generator);
}
