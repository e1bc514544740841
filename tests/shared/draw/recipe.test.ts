import { execFileSync } from "node:child_process";
import { describe, expect, test } from "vitest";
import { drawEntries } from "#shared/draw/draw.ts";
import { drawRecipe } from "#shared/draw/recipe.ts";

const frameSha256 = "860006035f65c32412122a35928cb1e481bec19a5e4e4deb882d6efb2101f207";

/** The same draw three ways: by the product, by the printed Python, by the printed shell. */
const statements = (["sha256-counter", "arc4"] as const).flatMap((generator) =>
  (["srs-wr", "srs-wor"] as const).flatMap((kind) =>
    ["07391522864013975605", `it's "étang" $HOME \\n 鸟 🐦 %s`].map((seed) => ({
      frameSha256,
      units: 40,
      design: { kind, n: 20 },
      seed,
      generator,
      reserves: 6,
    })),
  ),
);

const entriesOf = (statement: (typeof statements)[number]) => {
  const { units, design, seed, generator, reserves } = statement;
  return drawEntries({ sha256: frameSha256, units }, design, seed, generator, reserves)[0]?.entries ?? [];
};

describe("the recipe for other tools", { timeout: 60_000 }, () => {
  test.each(statements)("Python repeats $design.kind with $generator, seed $seed", (statement) => {
    const printed = execFileSync("python3", ["-I", "-"], { input: drawRecipe(statement).python, encoding: "utf8" });
    const expected = entriesOf(statement).map(
      (entry) => `${entry.position},${entry.unit},${entry.repeatOf ?? ""},${entry.reserve ? "reserve" : "pick"}`,
    );
    expect(printed.trimEnd().split(/\r?\n/)).toEqual(["position,unit,repeat_of,kind", ...expected]);
  });

  test.each(statements.filter((one) => one.generator === "sha256-counter"))(
    "a plain shell with sha256sum repeats $design.kind, seed $seed",
    (statement) => {
      const printed = execFileSync("sh", [], { input: drawRecipe(statement).shell, encoding: "utf8" });
      expect(printed.trimEnd().split("\n")).toEqual(
        entriesOf(statement).map((entry) => `${entry.position} ${entry.unit}`),
      );
    },
  );

  // The draw's text for arc4, hashed by Python's hashlib instead of the shell's tool.
  test("with arc4 the shell prints what the generator is seeded with", () => {
    const statement = {
      frameSha256,
      units: 40,
      design: { kind: "srs-wr", n: 3 },
      seed: "042",
      generator: "arc4",
      reserves: 0,
    } as const;
    const printed = execFileSync("sh", [], { input: drawRecipe(statement).shell, encoding: "utf8" });
    const program = `import hashlib; print(hashlib.sha256(b"quillet-draw/1|${frameSha256}|042|").hexdigest())`;
    expect(printed).toBe(execFileSync("python3", ["-I", "-c", program], { encoding: "utf8" }));
  });

  test("a frame of ten million cells is within the reach of both programs", () => {
    const statement = {
      frameSha256,
      units: 10_000_000,
      design: { kind: "srs-wr", n: 5 },
      seed: "9",
      generator: "sha256-counter",
      reserves: 0,
    } as const;
    const units = drawEntries(
      { sha256: frameSha256, units: 10_000_000 },
      statement.design,
      "9",
      "sha256-counter",
      0,
    )[0]?.entries.map((entry) => entry.unit);
    const recipe = drawRecipe(statement);
    const shell = execFileSync("sh", [], { input: recipe.shell, encoding: "utf8" });
    expect(
      shell
        .trimEnd()
        .split("\n")
        .map((line) => Number(line.split(" ")[1])),
    ).toEqual(units);
    const python = execFileSync("python3", ["-I", "-"], { input: recipe.python, encoding: "utf8" });
    expect(
      python
        .trimEnd()
        .split(/\r?\n/)
        .slice(1)
        .map((line) => Number(line.split(",")[1])),
    ).toEqual(units);
  });
});
