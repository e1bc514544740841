import { createHash } from "node:crypto";
import canonicalize from "canonicalize";
import { describe, expect, test } from "vitest";
import * as z from "zod";
import { listSha256 } from "#shared/frame/list.ts";
import {
  buildStatement,
  frameSha256,
  frameStatement,
  parseStatement,
  rebuildCells,
  statementText,
  type StatementParts,
} from "#shared/frame/statement.ts";
import { billionths } from "#shared/units/metric.ts";
import { rectangles } from "./boundaries.ts";

const PARTS: StatementParts = {
  crs: { text: "+proj=utm +zone=32 +datum=WGS84 +units=m +no_defs", epsg: 32632 },
  source: { sha256: "ab".repeat(32), crs: "EPSG:4326" },
  mending: ["Ring 3 was open; closed it."],
  area: { polygons: [[[0, 0, 25_000, 0, 25_000, 20_001, 0, 20_000]]] },
  spec: rectangles(10_000, 10_000),
  membership: { rule: "touch" },
  countIn: "inside",
  leftOut: [
    { column: 0, row: 0, reason: "bull in the field" },
    { column: 1, row: 2, reason: "cliff" },
  ],
  salt: "0123456789abcdef0123456789abcdef",
};

const built = buildStatement(PARTS);

describe("the frame statement", () => {
  // By hand: columns 0 … 2 and rows 0 … 1, and row 2 because the upper edge rises by a millimetre over 25 m: even its first cell holds
  // 10,000·0.4/2 = 2,000 of 10⁸ mm², 20,000 billionths. Two of the nine cells are left out.
  test("holds N and the hash of the list of the cells that follow from it", () => {
    expect(built.statement.units).toBe(7);
    expect(built.statement.listSha256).toBe(listSha256(built.cells));
    expect(built.statement.leftOut.map(({ reason }) => reason)).toEqual(["cliff", "bull in the field"]);
  });

  // Node's SHA-256 of the RFC 8785 form.
  test("is hashed in its canonical form, whatever the order of its members", () => {
    const { statement } = built;
    const shuffled = Object.fromEntries(Object.entries(statement).reverse()) as typeof statement;
    const expected = createHash("sha256")
      .update(canonicalize(statement) ?? "")
      .digest("hex");
    expect([frameSha256(statement), frameSha256(shuffled)]).toEqual([expected, expected]);
  });

  test("is read back from its text and gives the same list again from rings and spec alone", () => {
    const read = parseStatement(statementText(built.statement));
    expect(read).toEqual(built.statement);
    expect(rebuildCells(read)).toEqual(built.cells);
    expect(rebuildCells({ ...read, units: 1, listSha256: "00".repeat(32) })).toEqual(built.cells);
  });

  test("keeps a share with its billionths", () => {
    const { statement, cells } = buildStatement({
      ...PARTS,
      membership: { rule: "share", atLeast: billionths(500_000_000) },
      leftOut: [],
    });
    expect(rebuildCells(parseStatement(statementText(statement)))).toEqual(cells);
    expect(cells.units).toBe(6);
  });
});

describe("a statement that is not as it was sealed", () => {
  test("changing any one of its characters changes the hash or is refused", () => {
    const text = statementText(built.statement);
    const hash = frameSha256(built.statement);
    for (let i = 0; i < text.length; i += 1) {
      const other = text[i] === "1" ? "2" : "1";
      const changed = `${text.slice(0, i)}${other}${text.slice(i + 1)}`;
      let changedHash = "refused";
      try {
        changedHash = frameSha256(parseStatement(changed));
      } catch (error) {
        expect(error).toHaveProperty("code", "statement-invalid");
      }
      expect(changedHash, changed.slice(Math.max(0, i - 20), i + 20)).not.toBe(hash);
    }
  });

  test("numbers of 2⁵³ and more, fractions, unknown members and odd sides are refused by name", () => {
    const { statement } = built;
    const wrong: [string, unknown][] = [
      ["units", { ...statement, units: 2 ** 53 }],
      ["units", { ...statement, units: 7.5 }],
      ["cells.originEastMm", { ...statement, cells: { ...statement.cells, originEastMm: 0.5 } }],
      ["cells.widthMm", { ...statement, cells: { ...statement.cells, widthMm: 9_999 } }],
      [
        "rings.0.0.1.0",
        {
          ...statement,
          rings: [
            [
              [
                [0, 0],
                [2 ** 53, 0],
                [5, 5],
              ],
            ],
          ],
        },
      ],
      [
        "rings.0.0",
        {
          ...statement,
          rings: [
            [
              [
                [0, 0],
                [5, 5],
              ],
            ],
          ],
        },
      ],
      ["salt", { ...statement, salt: "0123" }],
      ["format", { ...statement, format: "quillet-frame/2" }],
      ["The whole", { ...statement, colour: "green" }],
    ];
    for (const [where, value] of wrong) {
      expect(() => parseStatement(JSON.stringify(value)), where).toThrow(where);
    }
    expect(() => parseStatement("{")).toThrow("no JSON text");
  });

  test("has a JSON Schema that can be published", () => {
    const schema = z.toJSONSchema(frameStatement) as { required: string[]; additionalProperties: boolean };
    expect(schema.additionalProperties).toBe(false);
    expect(schema.required).toContain("listSha256");
    expect(schema.required.length).toBe(14);
  });
});
