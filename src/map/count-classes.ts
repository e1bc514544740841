/** The six steps of the ramp: from and to inclusive for whole numbers; a decimal count belongs to the step of its rounded value, but only 0 itself is zero. */
export const COUNT_CLASSES = [
  { from: 0, label: "0", fill: "var(--color-count-0)" },
  { from: 1, label: "1", fill: "var(--color-count-1)" },
  { from: 2, label: "2–4", fill: "var(--color-count-2)" },
  { from: 5, label: "5–9", fill: "var(--color-count-3)" },
  { from: 10, label: "10–19", fill: "var(--color-count-4)" },
  { from: 20, label: "20+", fill: "var(--color-count-5)" },
] as const;

/** The step of a count, 0 to 5. Throws RangeError below zero and for what is no number: missing is never zero. */
export function countClass(value: number): 0 | 1 | 2 | 3 | 4 | 5 {
  if (!(value >= 0)) throw new RangeError(`no count: ${value}`);
  if (value === 0) return 0;
  const rounded = Math.max(1, Math.round(value));
  if (rounded < 2) return 1;
  if (rounded < 5) return 2;
  if (rounded < 10) return 3;
  return rounded < 20 ? 4 : 5;
}
