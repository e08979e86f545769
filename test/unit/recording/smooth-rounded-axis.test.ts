import { describe, expect, test } from 'vitest';
import { smoothRoundedAxis } from '../../../shared-core/recording/smooth-rounded-axis.ts';

const rounded = (curve: (px: number) => number, count: number, decimals: number): Float64Array =>
  Float64Array.from({ length: count }, (_, px) => Number(curve(px).toFixed(decimals)));
const worst = (axis: Float64Array, curve: (px: number) => number): number =>
  Math.max(...axis.map((value, px) => Math.abs(value - curve(px))));

describe('smoothRoundedAxis', () => {
  test('undoes rounding to a tenth of a straight axis to better than a hundredth', () => {
    const curve = (px: number): number => 350.4 + 0.6673 * px;
    const found = smoothRoundedAxis(rounded(curve, 824, 1), 1)!;
    expect(found.method).toBe('polynomial');
    expect(found.roundingStep).toBeCloseTo(0.1, 12);
    expect(worst(found.axis, curve)).toBeLessThan(0.01);
    expect(found.largestChange).toBeLessThanOrEqual(0.06);
  });

  test('follows an axis whose step changes along the detector', () => {
    const curve = (px: number): number => 380 + 0.72 * px - 4e-5 * px * px;
    const found = smoothRoundedAxis(rounded(curve, 640, 1), 1)!;
    expect(found.method).not.toBe('left');
    expect(worst(found.axis, curve)).toBeLessThan(0.02);
  });

  test('lets an axis be that is fine enough, even, or too short to tell', () => {
    expect(
      smoothRoundedAxis(
        rounded((px) => 370 + 0.0905 * px, 3648, 4),
        4,
      ),
    ).toBeNull();
    expect(
      smoothRoundedAxis(
        rounded((px) => 300 + 0.5 * px, 800, 1),
        1,
      ),
    ).toBeNull();
    expect(
      smoothRoundedAxis(
        rounded((px) => 300 + 0.67 * px, 10, 1),
        1,
      ),
    ).toBeNull();
  });

  test('keeps what is written where no smooth curve agrees with it', () => {
    const broken = rounded((px) => 300 + 0.67 * px + (px > 200 ? 3 : 0) + (px % 97 === 0 ? 0.3 : 0), 400, 1);
    const found = smoothRoundedAxis(broken, 1);
    if (found !== null && found.method === 'left') expect([...found.axis]).toEqual([...broken]);
    else expect(found === null || found.largestChange <= 0.061).toBe(true);
  });
});
