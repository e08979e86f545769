import { describe, expect, test } from 'vitest';
import { balmerAbsorption } from '../../../shared-core/physics/balmer-absorption.ts';
import { curveOfGrowth } from '../../../shared-core/physics/curve-of-growth.ts';
import { hydrogenLine } from '../../../shared-core/physics/hydrogen.ts';
import { gaussianAreaEscape } from '../../../shared-core/physics/self-absorption.ts';
import { areaDeficit } from '../../../shared-core/populations/area-deficit.ts';
import { depthOfDeficit, fitOpticalDepth } from '../../../shared-core/populations/optical-depth.ts';
import { poseBoltzmann } from '../../../shared-core/populations/pose-boltzmann.ts';
import { boltzmannArea, madeUpInput } from '../../support/made-up-fits.ts';

const lines = [3, 4, 5, 6, 7].map((level) => hydrogenLine(level));
const alpha = lines[0]!;
/** Hot enough that Doppler broadening rules and the shapes are Gaussian. */
const lamp = { gasTemperatureK: 40_000 };
const absorption = balmerAbsorption(lines, lamp, 0, alpha);
const boltzmannEvPerK = 8.617333262e-5;

test('depths of the Balmer lines go with f lambda where Doppler broadening rules', () => {
  // 1 : 0.1380 : 0.0461 : 0.02155, from published oscillator strengths (W. L. Wiese, J. R. Fuhr 2009).
  for (const [i, ratio] of [1, 0.138, 0.0461, 0.02155].entries()) {
    expect(Math.abs(absorption[i]!.relativeDepth / ratio - 1)).toBeLessThan(0.02);
  }
});

test('a line that ends on another level does not take part', () => {
  const paschen = { ...hydrogenLine(5), lowerLevel: 3 };
  expect(balmerAbsorption([paschen], lamp, 0, alpha)[0]!.relativeDepth).toBe(0);
});

test('a Stark width spreads the absorption of H-beta more than that of H-alpha', () => {
  const [, beta] = balmerAbsorption(lines, { gasTemperatureK: 1000 }, 1e20, alpha);
  const [, thin] = balmerAbsorption(lines, { gasTemperatureK: 1000 }, 0, alpha);
  expect(beta!.relativeDepth).toBeLessThan(0.7 * thin!.relativeDepth);
});

describe('temperature and depth together', () => {
  const kelvin = 6300;
  // Areas by the Ladenburg-Reiche series, which the fit does not use.
  const dimmed = (depth: number) =>
    lines.map((line, i) => ({
      line,
      area: boltzmannArea(line, alpha, kelvin) * gaussianAreaEscape(depth * absorption[i]!.relativeDepth),
      relativeSigma: 0.01,
    }));

  test.each([0, 0.3, 3, 8])('depth %d is found again, and so is the temperature', (depth) => {
    const { problem } = poseBoltzmann(madeUpInput(dimmed(depth)), [0, 1, 2, 3, 4]);
    const deficit = areaDeficit(problem, 0)!;
    const found = fitOpticalDepth(problem, absorption, { ...deficit, opticalDepth: 1 })!;
    expect(Math.abs(found.opticalDepth - depth)).toBeLessThan(0.01 * (1 + depth));
    expect(Math.abs(1 / (boltzmannEvPerK * found.inverseKtPerEv) - kelvin)).toBeLessThan(20);
    expect(found.chiSquare).toBeLessThan(0.01);
    expect(found.degreesOfFreedom).toBe(2);
    expect(found.opticalDepthSigma).toBeGreaterThan(0.02);
  });

  test('needs three lines', () => {
    const { problem } = poseBoltzmann(madeUpInput(dimmed(3).slice(0, 2)), [0, 1]);
    expect(
      fitOpticalDepth(problem, absorption.slice(0, 2), {
        lnPopulationAtMean: 0,
        inverseKtPerEv: 1,
        opticalDepth: 1,
      }),
    ).toBeNull();
  });
});

describe('the deficit of one line', () => {
  const made = lines.map((line, i) => ({
    line,
    area: boltzmannArea(line, alpha, 6300) * (i === 0 ? 0.8 : 1),
    relativeSigma: 0.02,
  }));
  const { problem } = poseBoltzmann(madeUpInput(made), [0, 1, 2, 3, 4]);

  test('is what was taken from it', () => {
    expect(areaDeficit(problem, 0)!.value).toBeCloseTo(-Math.log(0.8), 6);
    expect(1 / (boltzmannEvPerK * areaDeficit(problem, 0)!.inverseKtPerEv)).toBeCloseTo(6300, 0);
  });

  test('has the uncertainty of the line and of the extrapolation to it', () => {
    // Straight line through four points of 2 %, read at H-alpha: s^2 (1 + 1/4 + d^2/Sum of squares).
    const energies = lines.map(({ upperEnergyEv }) => upperEnergyEv);
    const others = energies.slice(1);
    const mean = others.reduce((sum, value) => sum + value, 0) / 4;
    const spread = others.reduce((sum, value) => sum + (value - mean) ** 2, 0);
    const expected = 0.02 * Math.sqrt(1 + 1 / 4 + (energies[0]! - mean) ** 2 / spread);
    expect(Math.abs(areaDeficit(problem, 0)!.sigma / expected - 1)).toBeLessThan(1e-3);
  });
});

describe('depth of a deficit', () => {
  const curve = curveOfGrowth(1, 0.2);
  test.each([-0.5, 0, 1e-4, 0.7, 5, 60])('depth %d comes back', (depth) => {
    expect(depthOfDeficit(curve, -Math.log(curve.escapeAt(depth).share))!).toBeCloseTo(depth, 7);
  });

  test('ends where the curve does', () => {
    expect(depthOfDeficit(curve, 20)).toBeNull();
    expect(depthOfDeficit(curve, -5)).toBe(-2);
  });
});
