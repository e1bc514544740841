import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, utf8ToBytes } from "@noble/hashes/utils.js";
import canonicalize from "canonicalize";
import * as z from "zod/mini";
import { design } from "./design.ts";
import { GENERATORS } from "./generator.ts";

export const DECLARATION_FORMAT = "quillet-declaration/1";

/** The limits that may be declared to be printed large. */
export const LIMITS = ["log-normal", "t"] as const;

/** Where the seed comes from. Sources that join later (dice, two parts, a public pulse) join this union. */
export const seedSource = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("made-here") }),
  z.strictObject({ kind: z.literal("typed") }),
]);
export type SeedSource = z.infer<typeof seedSource>;

const identifier = z.string().check(z.minLength(1), z.maxLength(100));

/**
 * What is fixed before the seed exists (rule R7): the frame, the design with all its numbers, the generator, the
 * reserves, the limits to be printed large at which level, and where the seed will come from.
 */
export const declaration = z.strictObject({
  format: z.literal(DECLARATION_FORMAT),
  surveyId: identifier,
  seasonId: identifier,
  frameSha256: z.string().check(z.regex(/^[0-9a-f]{64}$/)),
  design,
  generator: z.enum(GENERATORS),
  /** Reserves a stratum. */
  reserves: z.int().check(z.gte(0)),
  limits: z.enum(LIMITS),
  /** Decimal text above 0 and below 1, such as "0.95": a hashed statement holds no fractions as numbers. */
  level: z.string().check(z.regex(/^0\.(?=\d*[1-9])\d{1,6}$/)),
  seedSource,
  note: z.string().check(z.maxLength(2000)),
});
export type Declaration = z.infer<typeof declaration>;

/**
 * SHA-256, lower-case hex, of the RFC 8785 (JCS) form of a declaration.
 * @throws ZodError where it is not a declaration: a hash of anything else would prove nothing.
 */
export function declarationSha256(declared: Declaration): string {
  const text = canonicalize(declaration.parse(declared));
  if (text === undefined) throw new RangeError("a declaration has a canonical form");
  return bytesToHex(sha256(utf8ToBytes(text)));
}

/** What the way a seed came about shows, and what it does not; `chosenBy` is the name of who typed it. */
export function seedSourceSentence(source: SeedSource, chosenBy: string): string {
  switch (source.kind) {
    case "made-here":
      return "The seed was made by the server's random source after the declaration was sealed, once for this declaration.";
    case "typed":
      return `The seed was chosen by ${chosenBy}; nothing shows that only one was tried.`;
  }
}
