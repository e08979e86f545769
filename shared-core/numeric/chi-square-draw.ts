import { exp, log } from './portable-math.ts';
import type { Random } from './random.ts';

/**
 * One draw of chi-square: twice a gamma variable of shape a = nu/2, by squeezing a cubed normal; below two degrees of
 * freedom that of shape a + 1 times u^(1/a).
 *
 * @param degreesOfFreedom  > 0, not necessarily whole
 * @source [Marsaglia2000] sec. 2 and 6
 * @check  test/reference/chi-square-draw.test.ts
 */
export function drawChiSquare(random: Random, degreesOfFreedom: number): number {
  const shape = 0.5 * degreesOfFreedom;
  if (shape < 1) {
    const boosted = drawChiSquare(random, degreesOfFreedom + 2);
    return boosted * exp(log(1 - random.uniform()) / shape);
  }
  const d = shape - 1 / 3;
  const c = 1 / Math.sqrt(9 * d);
  for (;;) {
    const x = random.normal();
    const root = 1 + c * x;
    if (root <= 0) continue;
    const v = root * root * root;
    if (log(1 - random.uniform()) < 0.5 * x * x + d * (1 - v + log(v))) return 2 * d * v;
  }
}
