import { withReplacement, type SimpleDesign } from "./design.ts";
import { streamText, type GeneratorName } from "./generator.ts";
import { checkSeed } from "./seed.ts";

/** All that a simple random draw depends on. */
export interface DrawStatement {
  readonly frameSha256: string;
  readonly units: number;
  readonly design: SimpleDesign;
  readonly seed: string;
  readonly generator: GeneratorName;
  readonly reserves: number;
}

/** The same draw for tools that are not ours. */
export interface DrawRecipe {
  /** POSIX shell with `sha256sum`. With sha256-counter it prints position and unit of every entry; with arc4 the generator's seed. */
  readonly shell: string;
  /** A Python 3 program without any package: prints the whole list as CSV. */
  readonly python: string;
}

const shellQuoted = (text: string): string => `'${text.replaceAll("'", `'\\''`)}'`;
/** A JSON text is a Python text as well: a seed has no control characters, and neither has a hash. */
const pythonQuoted = (text: string): string => JSON.stringify(text);

/**
 * A shell program that repeats the draw. The remainder of the 256-bit number is taken digit by digit, so that the
 * shell's own whole numbers are enough (needs N < 2⁵⁹). On macOS `shasum -a 256` stands for `sha256sum`.
 */
function shellRecipe(statement: DrawStatement, text: string): string {
  if (statement.generator === "arc4") {
    return [
      "# The seed that the arc4 generator is given; the Python program goes on from here.",
      `printf %s ${shellQuoted(text)} | sha256sum | cut -c 1-64`,
      "",
    ].join("\n");
  }
  const skip = withReplacement(statement.design.kind)
    ? []
    : ['  case "$seen" in *" $unit "*) continue ;; esac', '  seen="$seen$unit "'];
  return [
    "# Prints position and unit of every pick and reserve. Where there is no sha256sum, write: shasum -a 256",
    `text=${shellQuoted(`${text}|`)}`,
    `units=${statement.units}`,
    `entries=${statement.design.n + statement.reserves}`,
    "k=0; position=0; seen=' '",
    'while [ "$position" -lt "$entries" ]; do',
    "  k=$((k + 1))",
    '  hex=$(printf %s "$text$k" | sha256sum | cut -c 1-64)',
    "  rest=0",
    '  while [ -n "$hex" ]; do',
    '    digit=${hex%"${hex#?}"}; hex=${hex#?}',
    "    rest=$(( (rest * 16 + 0x$digit) % units ))",
    "  done",
    "  unit=$((rest + 1))",
    ...skip,
    "  position=$((position + 1))",
    '  echo "$position $unit"',
    "done",
    "",
  ].join("\n");
}

const PYTHON_SHA256_COUNTER = `def stream(text):
    """Whole numbers below m: SHA-256 of the text, a bar and k = 1, 2, 3 ... as a big-endian number, modulo m."""
    k = 0
    def next_below(m):
        nonlocal k
        k += 1
        digest = hashlib.sha256((text + "|" + str(k)).encode("utf-8")).digest()
        return int.from_bytes(digest, "big") % m
    return next_below
`;

const PYTHON_ARC4 = `def stream(text):
    """Whole numbers below m: floor(value * m), value from ARC4 keyed with the hexadecimal SHA-256 of the text.

    The first 256 bytes of the key stream are dropped. A value has 52 bits: six bytes are a whole number over 2^48,
    a seventh (and eighth) is added until the number reaches 2^52; then it is halved until it is below 2^53.
    """
    key = hashlib.sha256(text.encode("utf-8")).hexdigest().encode("ascii")
    box = list(range(256))
    j = 0
    for i in range(256):
        j = (j + key[i % len(key)] + box[i]) % 256
        box[i], box[j] = box[j], box[i]
    i = j = 0
    def byte():
        nonlocal i, j
        i = (i + 1) % 256
        j = (j + box[i]) % 256
        box[i], box[j] = box[j], box[i]
        return box[(box[i] + box[j]) % 256]
    for _ in range(256):
        byte()
    def value():
        number, scale, last = 0, 2 ** 48, 0
        for _ in range(6):
            number = number * 256 + byte()
        while number < 2 ** 52:
            number, scale = (number + last) * 256, scale * 256
            last = byte()
        while number >= 2 ** 53:
            number, scale, last = number // 2, scale // 2, last // 2
        return (number + last) / scale
    return lambda m: int(value() * m)
`;

/** A Python program that prints `position,unit,repeat_of,kind`, one line an entry in the draw's order. */
function pythonRecipe(statement: DrawStatement, text: string): string {
  const repeatsStand = withReplacement(statement.design.kind);
  return `# Repeats one draw with nothing but Python 3: python3 draw.py
import hashlib

TEXT = ${pythonQuoted(text)}
UNITS = ${statement.units}
PICKS = ${statement.design.n}
RESERVES = ${statement.reserves}
WITH_REPLACEMENT = ${repeatsStand ? "True" : "False"}

${statement.generator === "arc4" ? PYTHON_ARC4 : PYTHON_SHA256_COUNTER}
next_below = stream(TEXT)
first = {}
position = 0
print("position,unit,repeat_of,kind")
while position < PICKS + RESERVES:
    unit = next_below(UNITS) + 1
    if unit in first and not WITH_REPLACEMENT:
        continue
    position += 1
    print(position, unit, first.get(unit, ""), "pick" if position <= PICKS else "reserve", sep=",")
    first.setdefault(unit, position)
`;
}

/** The draw as two programs for tools that everyone has: one page that an auditor can read and run. */
export function drawRecipe(statement: DrawStatement): DrawRecipe {
  const text = streamText(statement.frameSha256, checkSeed(statement.seed), "");
  return { shell: shellRecipe(statement, text), python: pythonRecipe(statement, text) };
}
