import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { readCsv, writeCsv } from "#shared/exchange/csv.ts";

const utf8 = (text: string) => new TextEncoder().encode(text);
const read = (text: string, options?: Parameters<typeof readCsv>[1]) => readCsv(utf8(text), options);

describe("a table written as CSV", () => {
  // RFC 4180: comma, CR LF, quotes doubled.
  test("has commas, CR LF, and quotes where they are needed", () => {
    expect(
      writeCsv(
        ["unit", "note"],
        [
          [1, 'say "here"'],
          [2, "a,b"],
          [3, null],
          [4, "line\nbreak"],
        ],
      ),
    ).toBe('unit,note\r\n1,"say ""here"""\r\n2,"a,b"\r\n3,\r\n4,"line\nbreak"\r\n');
  });

  test("text that a spreadsheet would run gets an apostrophe, numbers stay numbers", () => {
    const written = writeCsv(
      ["note"],
      [
        ["=CMD|' /C calc'!A0"],
        ["+1+1"],
        ["-2+3"],
        ["@SUM(A1)"],
        ["\tx"],
        [-3.5],
        ["-0.1234567"],
        ["+44"],
        ["＝1"],
        ["A-1"],
      ],
    );
    expect(written.split("\r\n").slice(1, -1)).toEqual([
      "'=CMD|' /C calc'!A0",
      "'+1+1",
      "'-2+3",
      "'@SUM(A1)",
      '"\'\tx"',
      "-3.5",
      "-0.1234567",
      "+44",
      "'＝1",
      "A-1",
    ]);
  });

  test("a byte order mark stands in front where it is wanted", () => {
    expect(writeCsv(["a"], [], { byteOrderMark: true })).toBe("\uFEFFa\r\n");
  });

  test("a row of another width, or a number that is none, is a bug and is told", () => {
    expect(() => writeCsv(["a", "b"], [[1]])).toThrow("row 1 has 1 cells, the header 2");
    expect(() => writeCsv(["a"], [[Number.NaN]])).toThrow("finite");
  });

  test("reads back as it was, formulas, quotes and line breaks too", () => {
    const text = fc.oneof(
      fc.string({ unit: "grapheme", maxLength: 12 }),
      fc.stringMatching(/^[=+\-@'"A1;,\n\r\t ]{0,8}$/),
    );
    fc.assert(
      fc.property(fc.array(fc.array(text, { minLength: 3, maxLength: 3 }), { maxLength: 8 }), (rows) => {
        const marked = rows.map((row, i) => [`r${i}`, ...row]);
        const { value } = read(writeCsv(["name", "one", "two", "three"], marked));
        expect(value).toMatchObject({ header: ["name", "one", "two", "three"], delimiter: ",", headerFound: true });
        // ="x" means the text x in every file that is read, and it is never written: it gets an apostrophe.
        expect(value.rows).toEqual(marked);
      }),
      { numRuns: 300 },
    );
  });
});

describe("a table that is read", () => {
  test("a plain one: header, rows, line numbers, nothing to tell", () => {
    expect(read("unit,count\n7,0\n9,12\n")).toEqual({
      value: {
        header: ["unit", "count"],
        rows: [
          ["7", "0"],
          ["9", "12"],
        ],
        lines: [2, 3],
        delimiter: ",",
        headerFound: true,
      },
      notes: [],
    });
  });

  test.each(["\n", "\r\n", "\r"])("lines may end with %j, the last one with nothing", (end) => {
    expect(read(["a,b", "1,2", "3,4"].join(end)).value.rows).toEqual([
      ["1", "2"],
      ["3", "4"],
    ]);
  });

  test("an empty cell stays empty, it is not zero", () => {
    expect(read("unit,count\n7,\n8,0\n").value.rows).toEqual([
      ["7", ""],
      ["8", "0"],
    ]);
  });

  test("quotes hold delimiters, line breaks and quotes; line numbers count the breaks", () => {
    const { value } = read('unit,note\n1,"a, ""b""\nc"\n2,d\n');
    expect(value.rows).toEqual([
      ["1", 'a, "b"\nc'],
      ["2", "d"],
    ]);
    expect(value.lines).toEqual([2, 4]);
  });

  test("semicolons and tabs are found and told", () => {
    expect(read("unit;count\n1;2\n").notes).toEqual(["The cells are separated by semicolons."]);
    expect(read("unit\tcount\n1\t2\n").value).toMatchObject({ delimiter: "\t", rows: [["1", "2"]] });
  });

  test("a comma inside the cells of a table with semicolons does not mislead", () => {
    expect(read("unit;note\n1;a, b\n2;c, d\n3;e\n").value).toMatchObject({ delimiter: ";", header: ["unit", "note"] });
    expect(read("unit,note\n1,a; b\n2,c; d\n").value).toMatchObject({ delimiter: ",", header: ["unit", "note"] });
  });

  // Both delimiters cut every line alike; the comma cuts it into more cells.
  test("where every line could be cut by either, the delimiter that gives more columns is taken", () => {
    expect(read("1,2,a; b\n3,4,c; d\n").value).toMatchObject({
      delimiter: ",",
      rows: [
        ["1", "2", "a; b"],
        ["3", "4", "c; d"],
      ],
    });
  });

  test("a first line sep=; tells the delimiter and is no row", () => {
    const { value } = read("sep=;\r\nunit;count\r\n1;2\r\n");
    expect(value).toMatchObject({ delimiter: ";", header: ["unit", "count"], rows: [["1", "2"]], lines: [3] });
  });

  test("one column needs no delimiter", () => {
    expect(read("count\n3\n0\n").value).toMatchObject({ header: ["count"], rows: [["3"], ["0"]] });
  });
});

describe("a table that is not quite as it should be", () => {
  // The form by which spreadsheets keep 001 from becoming 1, with quotes of the file around it and without.
  test('="001" is the text 001', () => {
    const { value, notes } = read('unit,count\n"=""001""",4\n="0,2",5\n');
    expect(value.rows).toEqual([
      ["001", "4"],
      ["0,2", "5"],
    ]);
    expect(notes).toEqual(['Cells written as ="…" were read as the text inside: 2.']);
  });

  test("rows that are too short are filled with empty cells, too long ones kept, both told", () => {
    const { value, notes } = read("unit,count,note\n1,2\n3,4,x,y\n");
    expect(value.rows).toEqual([
      ["1", "2", ""],
      ["3", "4", "x", "y"],
    ]);
    expect(notes).toEqual([
      "Fewer cells than columns, the rest taken as empty: line 2.",
      "More cells than columns: line 3. If a cell holds the delimiter, it must stand in quotes.",
    ]);
  });

  test("empty lines are left out and counted", () => {
    const { value, notes } = read("unit,count\n\n1,2\n,\n  ,\n");
    expect(value.rows).toEqual([["1", "2"]]);
    expect(value.lines).toEqual([3]);
    expect(notes).toEqual(["Empty lines left out: 3."]);
  });

  test("text behind a closing quote is kept and told", () => {
    const { value, notes } = read('unit,note\n1,"a"b\n2,"c" \n');
    expect(value.rows).toEqual([
      ["1", "ab"],
      ["2", "c"],
    ]);
    expect(notes).toEqual(["Text after a closing quote was kept: line 2."]);
  });
});

describe("a header", () => {
  test("that is missing is told, and the columns are numbered", () => {
    const { value, notes } = read("A1,3\nB2,0\n");
    expect(value).toMatchObject({
      header: ["column 1", "column 2"],
      headerFound: false,
      rows: [
        ["A1", "3"],
        ["B2", "0"],
      ],
      lines: [1, 2],
    });
    expect(notes).toEqual(["The first line holds a number and was taken for data: the columns have no names."]);
  });

  test("is what a person says it is", () => {
    expect(read("cell,2031\nA1,3\n", { headerIs: true }).value).toMatchObject({
      header: ["cell", "2031"],
      rows: [["A1", "3"]],
    });
    expect(read("a,b\nc,d\n", { headerIs: false })).toMatchObject({
      value: { headerFound: false, lines: [1, 2] },
      notes: [],
    });
  });
});

describe("numbers with a decimal comma", () => {
  test("are given with a point, and told", () => {
    const { value, notes } = read("unit;count;note\n1;2,5;x\n2;3;1,5 m\n3;-0,25;y\n");
    expect(value.rows).toEqual([
      ["1", "2.5", "x"],
      ["2", "3", "1,5 m"],
      ["3", "-0.25", "y"],
    ]);
    expect(notes).toContain("Numbers with a decimal comma were read as decimals: 2.");
  });

  // 12,345 in a table by itself may be 12.345 or 12345: a guess would be wrong by a thousand.
  test("stay as they are where all of them may be thousands", () => {
    const { value, notes } = read("unit;count\n1;12,345\n2;1,000\n");
    expect(value.rows).toEqual([
      ["1", "12,345"],
      ["2", "1,000"],
    ]);
    expect(notes).toContain("Numbers such as 12,345 may be decimals or thousands, and were left as they are: 2.");
  });

  test("12,345 is a decimal where another number shows that the comma is decimal", () => {
    expect(read("unit;a;b\n1;12,345;0,5\n").value.rows).toEqual([["1", "12.345", "0.5"]]);
  });

  test("a column that also uses the point stays as it is", () => {
    const { value, notes } = read("unit;a;b\n1;2,5;2,5\n2;2.5;3\n");
    expect(value.rows).toEqual([
      ["1", "2,5", "2.5"],
      ["2", "2.5", "3"],
    ]);
    expect(notes.at(-1)).toMatch("left as they are: 1");
  });
});
