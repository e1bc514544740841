import { describe, expect, test } from "vitest";
import { readCsv } from "#shared/exchange/csv.ts";
import { Problem } from "#shared/problem.ts";

const utf8 = (text: string) => new TextEncoder().encode(text);
const read = (text: string) => readCsv(utf8(text));

describe("bytes that become text", () => {
  const utf16 = (text: string, littleEndian: boolean) => {
    const bytes = new Uint8Array(text.length * 2);
    const view = new DataView(bytes.buffer);
    for (let i = 0; i < text.length; i += 1) view.setUint16(i * 2, text.charCodeAt(i), littleEndian);
    return bytes;
  };

  test("a UTF-8 byte order mark is taken off and told", () => {
    const { value, notes } = read("\uFEFFunit,count\n1,2\n");
    expect(value.header).toEqual(["unit", "count"]);
    expect(notes).toEqual(["Read as UTF-8 with a byte order mark."]);
  });

  test.each([
    ["UTF-16LE", true],
    ["UTF-16BE", false],
  ])("%s is read with its mark and without", (name, littleEndian) => {
    for (const mark of ["\uFEFF", ""]) {
      const { value, notes } = readCsv(utf16(`${mark}unit,name\n1,Ruß\n`, littleEndian));
      expect(value).toMatchObject({ header: ["unit", "name"], rows: [["1", "Ruß"]] });
      expect(notes).toEqual([`Read as ${name}.`]);
    }
  });

  // 0xDF is ß in Latin 1 and no UTF-8.
  test("bytes that are no UTF-8 are read as Latin 1, and told", () => {
    const { value, notes } = readCsv(Uint8Array.from("unit,name\n1,Ru\xdf\n", (letter) => letter.charCodeAt(0)));
    expect(value.rows).toEqual([["1", "Ruß"]]);
    expect(notes).toEqual([expect.stringMatching("Latin 1")]);
  });

  test.each([
    ["an empty file", new Uint8Array(), "This file is empty. Nothing was changed."],
    ["a workbook", Uint8Array.from([0x50, 0x4b, 3, 4, 0, 0]), "Save the sheet as CSV"],
    ["an old workbook", Uint8Array.from([0xd0, 0xcf, 0x11, 0xe0, 0xa1]), "Save the sheet as CSV"],
    ["a PDF", utf8("%PDF-1.7"), "This is a PDF"],
    ["other bytes", Uint8Array.from([1, 0, 2, 0, 0, 3, 0, 0, 0, 7]), "not a text"],
    ["empty lines only", utf8("\n,,\n\n"), "all of its lines are empty"],
    ["an open quote", utf8('unit,note\n1,"abc\n2,d\n'), "The quote that opens in line 2 is never closed"],
    ["a very long cell", utf8(`unit,note\n1,${"x".repeat(10_001)}\n`), "A cell in line 2 has 10001 characters"],
    ["very many columns", utf8(`${"a,".repeat(1001)}b\n`), "Line 1 has more than 1,000 cells"],
  ])("%s is refused with what to do", (_, bytes, told) => {
    expect(() => readCsv(bytes)).toThrow(Problem);
    expect(() => readCsv(bytes)).toThrow(told);
  });

  test("a cell of 10,000 characters and a line of 1,000 cells are read", () => {
    expect(read(`unit,note\n1,${"x".repeat(10_000)}\n`).value.rows[0]?.[1]).toHaveLength(10_000);
    expect(read(`${"a,".repeat(999)}b\n`).value.header).toHaveLength(1000);
  });

  test("two hundred thousand rows are read, one more is refused", { timeout: 60_000 }, () => {
    const rows = "1,2\n".repeat(200_000);
    expect(read(`unit,count\n${rows}`).value.rows).toHaveLength(200_000);
    expect(() => read(`unit,count\n${rows}3,4\n`)).toThrow("more than 200,000 rows");
    expect(() => read(`${rows}3,4\n`)).toThrow("more than 200,000 rows");
  });

  // Reading stops behind the limit: rows behind very many empty lines must not be lost without a word.
  test("empty lines count towards the limit, so that no row is left unread", { timeout: 60_000 }, () => {
    expect(() => read(`unit,count\n${",\n".repeat(200_005)}1,2\n`)).toThrow("more than 200,000 rows");
  });
});
