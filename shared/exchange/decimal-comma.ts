const COMMA_NUMBER = /^\s*[+-]?\d+,\d+\s*$/;
const POINT_NUMBER = /^\s*[+-]?\d+\.\d+\s*$/;
/** 12,345 may be twelve point something or twelve thousand. */
const MAY_BE_THOUSANDS = /^\s*[+-]?[1-9]\d{0,2},\d{3}\s*$/;

/**
 * Numbers with a decimal comma, given with a point. That they are decimals is known when at least one in the table can't be
 * thousands (3,5 or 0,125); if all could be (12,345), they stay as they are and it is told, so that reading them is refused rather than
 * guessed. A column that also has numbers with a point stays as it is.
 */
export function convertDecimalCommas(rows: readonly (readonly string[])[]): { rows: string[][]; notes: string[] } {
  const commaNumbers = rows.flatMap((row) => row.filter((cell) => COMMA_NUMBER.test(cell)));
  const found = commaNumbers.length;
  const known = commaNumbers.some((cell) => !MAY_BE_THOUSANDS.test(cell));
  const withPoint = new Set(rows.flatMap((row) => row.flatMap((cell, i) => (POINT_NUMBER.test(cell) ? [i] : []))));
  const asTheyAre = rows.map((row) => [...row]);
  if (found === 0) return { rows: asTheyAre, notes: [] };
  if (!known) {
    return {
      rows: asTheyAre,
      notes: [`Numbers such as 12,345 may be decimals or thousands, and were left as they are: ${found}.`],
    };
  }
  let converted = 0;
  const result = rows.map((row) =>
    row.map((cell, i) => {
      if (withPoint.has(i) || !COMMA_NUMBER.test(cell)) return cell;
      converted += 1;
      return cell.replace(",", ".");
    }),
  );
  const left = found - converted;
  return {
    rows: result,
    notes: [
      ...(converted > 0 ? [`Numbers with a decimal comma were read as decimals: ${converted}.`] : []),
      ...(left > 0 ? [`Numbers with a comma in columns that also use the point were left as they are: ${left}.`] : []),
    ],
  };
}
