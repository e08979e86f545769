import { describe, expect, test } from 'vitest';
import { boundsOf, coverageCases } from '../accuracy/coverage-cases.ts';
import { runCoverageCase, type Tally } from '../accuracy/run-coverage.ts';

const drawCount = 150;
/** Three binomial errors of the share that is promised. */
const slack = 3 * Math.sqrt((0.95 * 0.05) / drawCount);

function expectPromiseKept({ covered, measured, meanPull }: Tally, mostBias: number): void {
  expect(measured).toBe(drawCount);
  expect(covered / measured).toBeGreaterThanOrEqual(0.95 - slack);
  expect(Math.abs(meanPull)).toBeLessThan(mostBias + 3 / Math.sqrt(drawCount));
}

/**
 * Own simulation with known truth and the independent bound; `npm run accuracy coverage` prints the same with more draws.
 * An rms of n draws has the relative error 1 / sqrt(2 n).
 */
const sharpness: Readonly<Record<string, number>> = {
  bright: 1.05,
  faint: 1.05,
  dense: 1.1,
  'curved response': 1.05,
  'deuterium 20 %': 1.05,
  blended: 1.1,
  // The weights of the fit do not know of the memory of the noise.
  'smoothed over 5': 1.15,
};

describe.each(coverageCases.filter(({ name }) => name in sharpness))('$name', (each) => {
  test('intervals of temperature and density hold the truth, without bias, as sharp as the data allow', () => {
    const bounds = boundsOf(each);
    const { temperature, density } = runCoverageCase(each, drawCount);
    expectPromiseKept(temperature, 0.1);
    expectPromiseKept(density, 0.1);
    const most = sharpness[each.name]! * (1 + 3 / Math.sqrt(2 * drawCount));
    expect(temperature.rms / bounds.kelvin).toBeLessThan(most);
    expect(density.rms / bounds.lnDensity).toBeLessThan(most);
    // Far below would mean that the bound, or the simulation, is wrong.
    expect(temperature.rms / bounds.kelvin).toBeGreaterThan(0.95 - 3 / Math.sqrt(2 * drawCount));
    expect(density.rms / bounds.lnDensity).toBeGreaterThan(0.95 - 3 / Math.sqrt(2 * drawCount));
  });
});

test('eight bits: steps as coarse as the wings of lines cost sharpness, not the promise', () => {
  const { temperature, density } = runCoverageCase(
    coverageCases.find(({ name }) => name === '8-bit')!,
    drawCount,
  );
  // What lies below half a step is lost, which no noise model undoes: a quarter sigma.
  expectPromiseKept(temperature, 0.25);
  expectPromiseKept(density, 0.25);
});
