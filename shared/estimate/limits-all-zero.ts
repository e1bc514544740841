import type { AllZeroLimits } from "./result.ts";
import { checkLevel } from "./level.ts";

/**
 * Upper limits of the total where every count is zero. If objects lie independently at λ per cell, m distinct cells hold
 * none with chance exp(−m·λ); the λ at which that chance is α is −ln(α)/m, so the total is at most N·(−ln α)/m.
 *
 *   one-sided:  α = 1 − level       (2.996·N/m at 0.95)
 *   two-sided:  α = (1 − level)/2   (3.689·N/m at 0.95)
 *
 * m counts cells, not picks: a repeat looks at the same ground again. Clumped objects leave more room above.
 * @throws RangeError where there is no cell, or more than units.
 */
export function allZeroLimits(units: number, cells: number, level: number): AllZeroLimits {
  checkLevel(level);
  if (!(cells >= 1 && cells <= units)) throw new RangeError(`${cells} cells of ${units} can't have been counted`);
  const alpha = 1 - level;
  return {
    kind: "all-zero",
    model: "poisson",
    cells,
    oneSided: (units * -Math.log(alpha)) / cells,
    twoSided: (units * -Math.log(alpha / 2)) / cells,
  };
}
