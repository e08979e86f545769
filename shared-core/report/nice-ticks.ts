import { invariant } from '../result/result.ts';

export interface Ticks {
  readonly values: readonly number[];
  /** Power of ten of the last digit a label needs. */
  readonly place: number;
}

/**
 * Round positions for an axis: multiples of 1, 2 or 5 times a power of ten.
 *
 * Each value is read from its decimal text, so 3 * 0.1 is 0.3 and labels never show binary dust.
 *
 * @param low, high    ends of the axis in its unit, low < high
 * @param wantedCount  about how many steps fit; the step is the smallest round one that gives no more
 * @source own choice of the usual 1-2-5 series
 * @check  test/unit/report/nice-ticks.test.ts
 */
export function niceTicks(low: number, high: number, wantedCount: number): Ticks {
  invariant(high > low && wantedCount >= 1, 'an axis has a length and room for a tick');
  const rawStep = (high - low) / wantedCount;
  const exponent = Number(rawStep.toExponential().split('e')[1]);
  const mantissa = rawStep / Number(`1e${String(exponent)}`);
  const multiple = [1, 2, 5].find((each) => mantissa <= each * (1 + 1e-9)) ?? 10;
  const step = Number(`${String(multiple)}e${String(exponent)}`);
  const first = Math.ceil(low / step - 1e-9);
  const last = Math.floor(high / step + 1e-9);
  const values: number[] = [];
  for (let index = first; index <= last; index += 1)
    values.push(Number(`${String(index * multiple)}e${String(exponent)}`));
  return { values, place: multiple === 10 ? exponent + 1 : exponent };
}
