import { expect, test } from "vitest";
import { lengthText, readOrigin, readSide } from "../../../src/features/frame/read-length.ts";

test.each([
  ["20", 20_000],
  ["20 m", 20_000],
  ["20m", 20_000],
  [" 20 metres ", 20_000],
  ["20,5", 20_500],
  ["20.5", 20_500],
  ["1 500 m", 1_500_000],
  ["1\u202f500", 1_500_000],
  ["50 cm", 500],
  ["2 km", 2_000_000],
  ["0.002", 2],
  ["1500,5", 1_500_500],
])("a side of “%s” is read as %i mm", (text, millimetres) => {
  expect(readSide(text)).toEqual({ ok: true, millimetres });
});

test.each([
  ["", "Say how long the side of a cell is, for example 20 m."],
  ["0", "The side of a cell is above zero. Write metres, for example 20 m."],
  ["-5", "The side of a cell is above zero. Write metres, for example 20 m."],
  ["1,500", "“1,500” can be read in two ways. Write 1500 or 1.500."],
  ["twenty", "Write metres, for example 20 m."],
  ["20 ft", "“ft” is no unit that is read here. Write metres, for example 20 m."],
  ["1.2.3", "“1.2.3” is no length. Write metres, for example 20 m."],
  ["2e3", "“2e3” is no length. Write metres, for example 20 m."],
  ["20.0005", "Lengths are kept in whole millimetres. Use at most three decimals of a metre."],
  ["2000 km", "No cell is wider than 1 000 km. Write metres, for example 20 m."],
])("a side of “%s” is refused with what would do", (text, message) => {
  expect(readSide(text)).toEqual({ ok: false, message });
});

// A centre lies half a side from the corner, and must be a whole millimetre: 20 001 mm has neighbours 20 000 and 20 002.
test("an odd number of millimetres is refused with its two neighbours", () => {
  expect(readSide("20.001")).toEqual({
    ok: false,
    message: "A side is an even number of millimetres. Use 20\u00a0m or 20.002\u00a0m.",
  });
});

test("an origin may lie below zero and on an odd millimetre, a minus may be the typographic one", () => {
  expect(readOrigin("-3.001")).toEqual({ ok: true, millimetres: -3001 });
  expect(readOrigin("−3")).toEqual({ ok: true, millimetres: -3000 });
  expect(readOrigin("0")).toEqual({ ok: true, millimetres: 0 });
  expect(readOrigin("").ok).toBe(false);
});

test("a length is written as it is read again", () => {
  for (const millimetres of [20_000, 12_250, 2, 1_500_500]) {
    expect(readSide(lengthText(millimetres))).toEqual({ ok: true, millimetres });
  }
});
