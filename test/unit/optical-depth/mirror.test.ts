import { expect, test } from 'vitest';
import { mirrorCorrection } from '../../../shared-core/optical-depth/mirror.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../../support/check-values.ts';

test.each(checkKeys(/^mirror_correction/))('%s', (key) => {
  const { inputs } = checkValue(key);
  expectCheckValue(key, mirrorCorrection(numberInput(inputs, 'R_line'), numberInput(inputs, 'R_continuum')));
});

test('is tau/(1 - e^-tau), also where the line is thin and where it grows more than it should', () => {
  for (const gain of [0.3, 0.9]) {
    for (const depth of [1e-9, 1e-5, 1e-3, 0.3, 4]) {
      const ratio = 1 + gain * Math.exp(-depth);
      expect(mirrorCorrection(ratio, 1 + gain)).toBeCloseTo(depth / -Math.expm1(-depth), 8);
    }
  }
  expect(mirrorCorrection(1.8, 1.8)).toBe(1);
  expect(mirrorCorrection(1.85, 1.8)).toBeLessThan(1);
});
