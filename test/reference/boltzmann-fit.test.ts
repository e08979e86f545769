import { describe, expect, test } from 'vitest';
import { fitStraightLine } from '../../shared-core/numeric/fit-straight-line.ts';
import { boltzmannEvPerK } from '../../shared-core/physics/constants.ts';
import { curvature } from '../../shared-core/populations/curvature.ts';
import type { BoltzmannInput } from '../../shared-core/populations/boltzmann-input.ts';
import { fitBoltzmann } from '../../shared-core/populations/fit-boltzmann.ts';
import { influence } from '../../shared-core/populations/influence.ts';
import { expectCheckValue } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

/**
 * Worked example computed independently with mpmath and SciPy: power-like areas of H-alpha to H-delta with relative
 * uncertainties 2, 3, 5, 8 %; g A of W. L. Wiese, J. R. Fuhr (2009), levels of A. Kramida (2010).
 */
const wavelengthNm = [656.279, 486.135, 434.0472, 410.1734];
const weightTimesA = [18 * 4.4101e7, 32 * 8.4193e6, 50 * 2.5304e6, 72 * 9.732e5];
const energyEv = [12.08750516, 12.74853932, 13.05450169, 13.22070389];
const area = [1000, 131, 35.2, 13.1];
const relative = [0.02, 0.03, 0.05, 0.08];

const diagonal = (values: readonly number[]): Float64Array => {
  const n = values.length;
  const matrix = new Float64Array(n * n);
  for (const [i, value] of values.entries()) matrix[i * n + i] = value;
  return matrix;
};
const ordinate = Float64Array.from(area, (value, i) =>
  Math.log((value * wavelengthNm[i]!) / weightTimesA[i]!),
);
const x = Float64Array.from(energyEv);

describe('the Boltzmann plot', () => {
  test('weighted: slope, its variance, chi-square, temperature and its uncertainty of the worked example', () => {
    const line = fitStraightLine(x, ordinate, diagonal(relative.map((u) => u * u)))!;
    expectClose(line.slope, {
      expected: -1.976234232,
      rel: 1e-8,
      because: 'independent computation, printed digits',
    });
    expectClose(line.slopeVariance, { expected: 0.001525091949, rel: 5e-7, because: 'the same' });
    expectClose(line.chiSquare, { expected: 6.0577357804, rel: 5e-7, because: 'the same' });
    const kelvin = -1 / (boltzmannEvPerK * line.slope);
    expectClose(kelvin, { expected: 5872.0358, rel: 5e-7, because: 'the same' });
    expectClose(boltzmannEvPerK * kelvin * kelvin * Math.sqrt(line.slopeVariance), {
      expected: 116.0375,
      rel: 1e-5,
      because: 'the same',
    });
  });

  test('generalised: a common 10 % and a tilt correlated between lines double the uncertainty', () => {
    const covariance = diagonal(relative.map((u) => u * u));
    const tilt = wavelengthNm.map((nm) => (0.05 * (nm - 550)) / 150);
    for (let i = 0; i < 4; i++) {
      for (let j = 0; j < 4; j++) covariance[i * 4 + j] = covariance[i * 4 + j]! + 0.01 + tilt[i]! * tilt[j]!;
    }
    const line = fitStraightLine(x, ordinate, covariance)!;
    expectClose(line.slope, { expected: -2.008612456, rel: 5e-7, because: 'independent computation' });
    expectCheckValue('fit.GLS_example2', line.slopeVariance, 'var_slope');
    expectCheckValue('fit.GLS_example2', line.interceptVariance, 'var_intercept');
    expectCheckValue('fit.GLS_example2', line.covariance, 'cov');
    expectCheckValue('fit.GLS_example2', line.intercept, 'intercept');
    expectClose(line.chiSquare, { expected: 5.8856782, rel: 5e-7, because: 'the same' });
    const kelvin = -1 / (boltzmannEvPerK * line.slope);
    expectClose(kelvin, { expected: 5777.3803, rel: 5e-7, because: 'the same' });
    expectClose(boltzmannEvPerK * kelvin * kelvin * Math.sqrt(line.slopeVariance), {
      expected: 251.0489,
      rel: 1e-5,
      because: 'the same',
    });
  });

  test('curvature of the worked example', () => {
    const bend = curvature({
      upperEnergyEv: x,
      ordinate,
      ordinateCovariance: diagonal(relative.map((u) => u * u)),
    })!;
    expectClose(bend.value, { expected: -0.393602502, rel: 5e-7, because: 'independent computation' });
    expectClose(bend.z, { expected: -2.40499826, rel: 5e-7, because: 'the same' });
    expectCheckValue('fit.curvature_example3', bend.value, 'c2');
    expectCheckValue('fit.curvature_example3', bend.sigma, 'u_c2');
    expectCheckValue('fit.curvature_example3', bend.z, 'z');
  });
});

/** Photon ratios to H-beta at 5000 K, computed independently from the same published tables. */
const photonAt5000 = [13.66432174, 1, 0.2308536348, 0.0869336055];

function input(areas: readonly number[], sigma: readonly number[]): BoltzmannInput {
  return {
    area: Float64Array.from(areas),
    areaCovariance: diagonal(sigma.map((value) => value * value)),
    variancePerArea: 0,
    areaPerPopulation: Float64Array.from(weightTimesA),
    upperEnergyEv: x,
    relativeCovariance: new Float64Array(16),
  };
}

describe('the fit of areas', () => {
  test('returns 5000 K for the photon ratios of 5000 K', () => {
    const fit = fitBoltzmann(
      input(
        photonAt5000,
        photonAt5000.map((value) => 0.01 * value),
      ),
    )!;
    expect(fit.isConverged).toBe(true);
    expectClose(1 / (boltzmannEvPerK * fit.inverseKtPerEv), {
      expected: 5000,
      rel: 2e-8,
      because: 'ten printed digits',
    });
    expect(fit.line.chiSquare).toBeLessThan(1e-10);
  });

  test('keeps a line that is lost in the noise, negative area and all, without harm', () => {
    const areas = [...photonAt5000.slice(0, 3), -0.01];
    const fit = fitBoltzmann(input(areas, [0.05, 0.01, 0.01, 0.2]))!;
    expect(fit.isConverged).toBe(true);
    const kelvin = 1 / (boltzmannEvPerK * fit.inverseKtPerEv);
    expect(Math.abs(kelvin - 5000)).toBeLessThan(15);
    expect(fit.expectedArea[3]!).toBeGreaterThan(0);
  });

  test('refuses fewer than two usable lines', () => {
    expect(fitBoltzmann(input([1, -1, -1, -1], [0.1, 1, 1, 1]))).toBeNull();
  });

  test('influence: the line that was moved is the one that pulls, and its leave-out answer is the truth', () => {
    const areas = [...photonAt5000];
    areas[3] = areas[3]! * 1.5;
    const fit = fitBoltzmann(
      input(
        areas,
        areas.map((value) => 0.02 * value),
      ),
    )!;
    const pulls = influence(fit);
    const worst = pulls.reduce((most, pull) =>
      Math.abs(pull.shiftSigma) > Math.abs(most.shiftSigma) ? pull : most,
    );
    expect(worst.index).toBe(3);
    expect(Math.abs(worst.shiftSigma)).toBeGreaterThan(5);
    expect(Math.abs(worst.kelvinWithout! - 5000)).toBeLessThan(20);
  });
});
