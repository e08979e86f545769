import { describe, expect, test } from 'vitest';
import { faddeeva } from '../../shared-core/numeric/faddeeva.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

function at(x: number, y: number): { re: number; im: number } {
  const out = { re: 0, im: 0 };
  faddeeva(x, y, out);
  return out;
}

describe('w(z)', () => {
  const keys = checkKeys(/^faddeeva/);

  test('lies within 1e-12 of its peak everywhere, and within 1e-11 of itself off the axis', () => {
    expect(keys).toHaveLength(14);
    for (const key of keys) {
      const { expected, inputs, verifiedBy } = checkValue(key);
      const [re, im] = expected as [number, number];
      const y = numberInput(inputs, 'y');
      const value = at(numberInput(inputs, 'x'), y);
      const allowed = y >= 0.1 ? { rel: 1e-11 } : { abs: 1e-12 };
      expectClose(value.re, { expected: re, ...allowed, because: `${key}; ${verifiedBy}` });
      expectClose(value.im, { expected: im, rel: 1e-12, abs: 1e-12, because: `${key}; ${verifiedBy}` });
    }
  });

  // exp(-z^2) erfc(-i z) with 40 digits.
  test.each([
    [0, -0.5, 1.9523604891825571, 0],
    [1, -0.3, 0.29504881814719705, 0.88178928324016787],
    [3, -0.1, -0.0077369246760684251, 0.20088310857258654],
    [8, -0.4, -0.0036027078891131035, 0.070903512426290076],
    [0.2, -0.05, 1.0151053318068955, 0.24008697104188618],
  ])('goes on below the axis: %d %d i', (x, y, re, im) => {
    const value = at(x, y);
    expectClose(value.re, { expected: re, abs: 1e-10, because: '40 digits' });
    expectClose(value.im, { expected: im, abs: 1e-10, because: '40 digits' });
  });

  test('is mirrored: w(-x + i y) is the conjugate of w(x + i y)', () => {
    for (const [x, y] of [
      [0.3, 0.2],
      [4, 1e-3],
      [60, 2],
    ] as const) {
      const right = at(x, y);
      const left = at(-x, y);
      expectClose(left.re, { expected: right.re, rel: 1e-13, because: 'symmetry' });
      expectClose(left.im, { expected: -right.im, rel: 1e-13, because: 'symmetry' });
    }
  });
});

test('the Voigt profile of unit area: peak, and value one Gauss width off the centre', () => {
  const fwhmPerSigma = Math.sqrt(8 * Math.LN2);
  for (const key of checkKeys(/^voigt\.(peak|value_at_fwhmG)_unit_area/)) {
    const { inputs } = checkValue(key);
    const sigma = numberInput(inputs, 'fwhm_G') / fwhmPerSigma;
    const x = key.includes('value_at') ? numberInput(inputs, 'x') : 0;
    const y = numberInput(inputs, 'fwhm_L') / 2 / (sigma * Math.SQRT2);
    expectCheckValue(key, at(x / (sigma * Math.SQRT2), y).re / (sigma * Math.sqrt(2 * Math.PI)));
  }
});
