import { describe, expect, test } from 'vitest';
import { curveOfGrowth } from '../../shared-core/physics/curve-of-growth.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';
import { gaussianAreaEscape, lorentzianAreaEscape } from '../../shared-core/physics/self-absorption.ts';

const depths = [0.01, 0.5, 3, 10, 50];

/** mpmath, 25 digits: quad of (1 - exp(-tau p)) over quad of p, p = Re w(x + i a)/Re w(i a). */
describe.each([
  [1, 0, [0.9964740678024, 0.8448917105753, 0.4471137375695, 0.1869585115955, 0.04736277427598]],
  [1, 0.05, [0.9965398586212, 0.8477516500005, 0.4567624755988, 0.1997613855132, 0.05953783559983]],
  [1, 0.5, [0.9969451401533, 0.8652716306803, 0.5141911824551, 0.2707681643108, 0.1136500013223]],
  [1, 2, [0.9973578537377, 0.8828847023637, 0.5684081373388, 0.3296945128366, 0.1489678084801]],
  [0.05, 1, [0.9975040052503, 0.8890363865289, 0.5862090399519, 0.3472602024944, 0.158636075434]],
  [0, 1, [0.9975062370019, 0.8891297908371, 0.5864729964751, 0.3475130795539, 0.1587728868667]],
])('Gauss width %d and Lorentz width %d', (gaussian, lorentzian, expected) => {
  const curve = curveOfGrowth(gaussian, lorentzian);

  test.each(depths.map((depth, i) => [depth, expected[i]!]))('depth %d', (depth, share) => {
    expect(Math.abs(curve.escapeAt(depth).share / share - 1)).toBeLessThan(1e-6);
  });

  test('the slope is the derivative, also about zero and below', () => {
    for (const depth of [-0.5, -1e-6, 0, 1e-6, 0.3, 4]) {
      const step = 1e-3;
      const numeric = (curve.escapeAt(depth + step).share - curve.escapeAt(depth - step).share) / (2 * step);
      expect(Math.abs(curve.escapeAt(depth).slope - numeric)).toBeLessThan(1e-6);
    }
    expect(curve.escapeAt(0).share).toBe(1);
  });
});

test('agrees with the series of the pure shapes', () => {
  for (const depth of [0.1, 1, 5]) {
    expect(curveOfGrowth(0.013, 0).escapeAt(depth).share).toBeCloseTo(gaussianAreaEscape(depth), 7);
    expect(curveOfGrowth(0, 0.02).escapeAt(depth).share).toBeCloseTo(lorentzianAreaEscape(depth), 6);
  }
});

test('the peak of the unit-area profile is that of the published values', () => {
  for (const key of checkKeys(/^voigt\.peak_unit_area/)) {
    const { inputs } = checkValue(key);
    expectCheckValue(key, curveOfGrowth(numberInput(inputs, 'fwhm_G'), numberInput(inputs, 'fwhm_L')).peak);
  }
  expect(curveOfGrowth(0, 2).peak).toBeCloseTo(1 / Math.PI, 14);
});
