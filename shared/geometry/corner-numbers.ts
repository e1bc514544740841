/** Numbers places 0, 1, 2 … in the order in which they are first asked for (open addressing, linear probing). */
export class CornerNumbers {
  private readonly slots: Int32Array;
  private readonly x: Float64Array;
  private readonly y: Float64Array;
  count = 0;

  /** `most` places at most. */
  constructor(most: number) {
    let size = 16;
    while (size < 2 * most) size *= 2;
    this.slots = new Int32Array(size).fill(-1);
    this.x = new Float64Array(most);
    this.y = new Float64Array(most);
  }

  /** The number of a place in whole millimetres. */
  numberOf(x: number, y: number): number {
    const { slots } = this;
    const mask = slots.length - 1;
    let hash = Math.imul(x | 0, 0x9e3779b1) ^ Math.imul(y | 0, 0x85ebca6b);
    hash ^= hash >>> 15;
    for (let slot = hash & mask; ; slot = (slot + 1) & mask) {
      const number = slots[slot] ?? -1;
      if (number < 0) {
        slots[slot] = this.count;
        this.x[this.count] = x;
        this.y[this.count] = y;
        this.count += 1;
        return this.count - 1;
      }
      if (this.x[number] === x && this.y[number] === y) return number;
    }
  }
}
