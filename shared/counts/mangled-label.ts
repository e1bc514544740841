const MONTH = "(?:jan|feb|mar|apr|may|jun|jul|aug|sep|sept|oct|nov|dec)[a-z]*";
const DATE = new RegExp(
  `^(?:\\d{1,4}[-./ ]${MONTH}\\.?(?:[-./ ]\\d{2,4})?|${MONTH}\\.?[-./ ]\\d{1,4}|\\d{1,4}[-./]\\d{1,2}[-./]\\d{1,4}(?:[ T].*)?)$`,
  "i",
);
const EXPONENT = /^\d+(?:[.,]\d+)?e[+-]?\d+$/i;
/** Day numbers of spreadsheets from 1950 to 2100. */
const FIRST_DAY = 18_264;
const LAST_DAY = 73_415;

/**
 * What a spreadsheet made of a cell's label, if it looks so: a label such as MAR3 becomes the date 3-Mar, the day number
 * 45354 or an exponent such as 1.00E+05.
 */
export function mangledAs(label: string): "a date" | "a day number" | "an exponent" | "no" {
  const text = label.trim();
  if (text.length > 40) return "no";
  if (DATE.test(text)) return "a date";
  if (EXPONENT.test(text)) return "an exponent";
  const day = /^\d{5}(?:[.,]\d+)?$/.test(text) ? Number(text.slice(0, 5)) : 0;
  return day >= FIRST_DAY && day <= LAST_DAY ? "a day number" : "no";
}
