import { expect, test } from 'vitest';
import { hydrogenLine } from '../../../shared-core/physics/hydrogen.ts';
import { lineRatios } from '../../../shared-core/populations/line-ratios.ts';
import { boltzmannArea, madeUpInput } from '../../support/made-up-fits.ts';

const alpha = hydrogenLine(3);
const beta = hydrogenLine(4);
const pair = (ratio: number, relativeSigma = 0.01) =>
  [
    { line: alpha, area: 1000 * ratio, relativeSigma },
    { line: beta, area: 1000, relativeSigma },
  ] as const;
const energy = { detector: { signal: 'energy' } } as const;

// Published transition probabilities and levels, computed apart: W. L. Wiese, J. R. Fuhr (2009); A. Kramida (2010).
test.each([
  ['photon', 8, 7679.815217, 2.946422],
  ['photon', 20, 4005.440958, 2.946422],
  ['energy', 8, 5905.527856, 2.182546],
  ['energy', 20, 3462.821994, 2.182546],
] as const)('%s ratio %d of H-alpha and H-beta gives %d K; the limit is %d', (unit, ratio, kelvin, limit) => {
  const bench = unit === 'energy' ? energy : {};
  const [found] = lineRatios(madeUpInput(pair(ratio), { bench }), [0, 1], 0.95);
  expect(found!.status).toBe('measured');
  expect(Math.abs(found!.kelvin! / kelvin - 1)).toBeLessThan(5e-5);
  expect(Math.abs(found!.limit / limit - 1)).toBeLessThan(5e-5);
  // u(T)/T = (kT/dE) u(ln R), R with two areas of 1 % and two transition probabilities of 1e-4.
  const half = (8.617333e-5 * kelvin * 1.959964 * Math.sqrt(2e-4 + 2e-8)) / 0.6610342;
  expect(Math.abs(found!.lowKelvin! / (kelvin / (1 + half)) - 1)).toBeLessThan(1e-4);
  expect(Math.abs(found!.highKelvin! / (kelvin / (1 - half)) - 1)).toBeLessThan(1e-4);
  expect(found!.ratioSigma! / found!.ratio!).toBeCloseTo(Math.SQRT2 * 0.01, 5);
});

test('a ratio at its limit gives a lower limit, one below it no temperature, and neither a value', () => {
  const [at] = lineRatios(madeUpInput(pair(2.95)), [0, 1], 0.95);
  expect(at).toMatchObject({ status: 'lower-limit', kelvin: null, highKelvin: null });
  expect(at!.lowKelvin!).toBeGreaterThan(100_000);
  const [below] = lineRatios(madeUpInput(pair(2)), [0, 1], 0.95);
  expect(below).toMatchObject({ status: 'no-positive-temperature', kelvin: null, lowKelvin: null });
  expect(below!.reason).toContain('infinite temperature');
  const [lost] = lineRatios(madeUpInput(pair(-1)), [0, 1], 0.95);
  expect(lost).toMatchObject({ status: 'not-determined', ratio: null });
});

test('neighbours and the outermost pair, none twice', () => {
  const lines = [3, 4, 5, 6].map((level) => hydrogenLine(level));
  const made = lines.map((line) => ({ line, area: boltzmannArea(line, alpha, 7000), relativeSigma: 0.01 }));
  const found = lineRatios(madeUpInput(made), [0, 1, 2, 3], 0.95);
  expect(found.map(({ numerator, denominator }) => `${numerator}/${denominator}`)).toEqual([
    'H-alpha/H-beta',
    'H-beta/H-gamma',
    'H-gamma/H-delta',
    'H-alpha/H-delta',
  ]);
  for (const { kelvin } of found) expect(Math.abs(kelvin! - 7000)).toBeLessThan(1);
  expect(lineRatios(madeUpInput(made), [1], 0.95)).toEqual([]);
});
