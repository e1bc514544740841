import { execFileSync } from "node:child_process";
import { describe, expect, test } from "vitest";
import { declaration, declarationSha256, seedSourceSentence, type Declaration } from "#shared/draw/declaration.ts";

const declared: Declaration = {
  format: "quillet-declaration/1",
  surveyId: "survey-1",
  seasonId: "season-1",
  frameSha256: "a".repeat(64),
  design: { kind: "srs-wr", n: 60 },
  generator: "sha256-counter",
  reserves: 12,
  limits: "log-normal",
  level: "0.95",
  seedSource: { kind: "made-here" },
  note: "Ruß: 60 from the pilot",
};

describe("a declaration", { timeout: 30_000 }, () => {
  // For keys in ASCII and whole numbers Python's sorted, compact JSON in UTF-8 is the RFC 8785 form.
  test("its hash is the SHA-256 of its canonical JSON, as Python computes it", () => {
    const program =
      'import sys, json, hashlib; print(hashlib.sha256(json.dumps(json.load(sys.stdin), sort_keys=True, separators=(",", ":"), ensure_ascii=False).encode()).hexdigest(), end="")';
    const outside = execFileSync("python3", ["-I", "-X", "utf8", "-c", program], {
      input: JSON.stringify(declared),
      encoding: "utf8",
    });
    expect(declarationSha256(declared)).toBe(outside);
  });

  test("its hash does not depend on the order of the fields", () => {
    const turned = Object.fromEntries(Object.entries(declared).toReversed());
    expect(declarationSha256(declaration.parse(turned))).toBe(declarationSha256(declared));
  });

  test.each([
    { design: { kind: "srs-wr" as const, n: 61 } },
    { design: { kind: "srs-wor" as const, n: 60 } },
    { reserves: 13 },
    { generator: "arc4" as const },
    { limits: "t" as const },
    { level: "0.9" },
    { seedSource: { kind: "typed" as const } },
    { note: "" },
    { frameSha256: "b".repeat(64) },
  ])("%o gives another hash", (change) => {
    expect(declarationSha256({ ...declared, ...change })).not.toBe(declarationSha256(declared));
  });

  test.each(["0.95", "0.9", "0.999", "0.5"])("a level of %s is read", (level) => {
    expect(declaration.safeParse({ ...declared, level }).success).toBe(true);
  });
  test.each(["95", "1", "1.0", "0", "0.000", "0,95", "", ".95", " 0.95"])("a level of '%s' is none", (level) => {
    expect(declaration.safeParse({ ...declared, level }).success).toBe(false);
  });

  test("a field that is not declared is refused, because the hash would not cover what it means", () => {
    expect(declaration.safeParse({ ...declared, seed: "42" }).success).toBe(false);
    expect(() => declarationSha256({ ...declared, reserves: 1.5 })).toThrow();
  });

  test("a typed seed is said to prove repeatability only", () => {
    expect(seedSourceSentence({ kind: "typed" }, "Ida Holm")).toBe(
      "The seed was chosen by Ida Holm; nothing shows that only one was tried.",
    );
    expect(seedSourceSentence({ kind: "made-here" }, "Ida Holm")).not.toMatch("Ida");
  });
});
