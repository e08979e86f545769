import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { fitStraightLine, type StraightLine } from '../../shared-core/numeric/fit-straight-line.ts';
import { boltzmannEvPerK } from '../../shared-core/physics/constants.ts';
import { checkValue, expectCheckValue, type Inputs } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';
import { projectRoot } from '../support/source-files.ts';

const numbers = (inputs: Inputs, name: string): readonly number[] => inputs[name] as readonly number[];

function fit(
  x: readonly number[],
  y: readonly number[],
  covariance: (i: number, j: number) => number,
): StraightLine {
  const n = x.length;
  const matrix = Float64Array.from({ length: n * n }, (_, k) => covariance(Math.floor(k / n), k % n));
  const line = fitStraightLine(Float64Array.from(x), Float64Array.from(y), matrix);
  if (line === null) throw new Error('no line');
  return line;
}

const unit = (i: number, j: number): number => (i === j ? 1 : 0);

describe('NIST StRD, Norris', () => {
  const { x, y, certified } = JSON.parse(
    readFileSync(join(projectRoot, 'test/data/strd-norris.json'), 'utf8'),
  ) as { x: number[]; y: number[]; certified: Readonly<Record<string, number>> };

  test('certified parameters, deviations and residual', () => {
    const line = fit(x, y, unit);
    const residual = Math.sqrt(line.chiSquare / line.degreesOfFreedom);
    const because = 'J. Norris, NIST Statistical Reference Datasets, certified value';
    for (const [name, value, rel] of [
      ['intercept', line.intercept, 1e-9],
      ['slope', line.slope, 1e-13],
      ['interceptDeviation', residual * Math.sqrt(line.interceptVariance), 1e-10],
      ['slopeDeviation', residual * Math.sqrt(line.slopeVariance), 1e-10],
      ['residualDeviation', residual, 1e-10],
    ] as const) {
      expectClose(value, { expected: certified[name]!, rel, because: `${because}: ${name}` });
    }
    expect(line.degreesOfFreedom).toBe(34);
  });
});

test('GUM H.3, calibration of a thermometer', () => {
  const key = 'gum.H3';
  const { inputs } = checkValue(key);
  const t0 = inputs['t0'] as number;
  const line = fit(
    numbers(inputs, 't_C').map((t) => t - t0),
    numbers(inputs, 'b_C'),
    unit,
  );
  const s = Math.sqrt(line.chiSquare / line.degreesOfFreedom);
  expectCheckValue(key, line.intercept, 'y1');
  expectCheckValue(key, line.slope, 'y2');
  expectCheckValue(key, s * Math.sqrt(line.interceptVariance), 's_y1');
  expectCheckValue(key, s * Math.sqrt(line.slopeVariance), 's_y2');
  expectCheckValue(key, s, 's');
  const correlation = line.covariance / Math.sqrt(line.interceptVariance * line.slopeVariance);
  expectClose(correlation, { expected: -0.93043, abs: 5e-6, because: 'published -0.930' });
  expectCheckValue(key, line.intercept + 10 * line.slope, 'b(30)');
  const variance = line.interceptVariance + 20 * line.covariance + 100 * line.slopeVariance;
  expectCheckValue(key, s * Math.sqrt(variance), 'u_b(30)');
});

describe('Boltzmann plots worked independently', () => {
  function worked(
    key: string,
    covariance: (inputs: Inputs) => (i: number, j: number) => number,
  ): StraightLine {
    const { inputs } = checkValue(key);
    const y = numbers(inputs, 'I').map((area, i) =>
      Math.log((area * numbers(inputs, 'lambda_nm')[i]!) / numbers(inputs, 'gA')[i]!),
    );
    return fit(numbers(inputs, 'E_eV'), y, covariance(inputs));
  }
  const own = (inputs: Inputs) => (i: number, j: number) => unit(i, j) * numbers(inputs, 'rel_u')[i]! ** 2;
  const shared = (inputs: Inputs) => (i: number, j: number) => {
    const tilt = (k: number): number => (0.05 * (numbers(inputs, 'lambda_nm')[k]! - 550)) / 150;
    return own(inputs)(i, j) + 0.01 + tilt(i) * tilt(j);
  };

  test.each([
    ['fit.WLS_example1', own],
    ['fit.GLS_example2', shared],
  ])('%s', (key, covariance) => {
    const line = worked(key, covariance);
    expectCheckValue(key, line.intercept, 'intercept');
    expectCheckValue(key, line.slope, 'slope_per_eV');
    expectCheckValue(key, line.interceptVariance, 'var_intercept');
    expectCheckValue(key, line.slopeVariance, 'var_slope');
    expectCheckValue(key, line.covariance, 'cov');
    expectCheckValue(key, line.chiSquare, 'chi2');
    const kelvin = -1 / (boltzmannEvPerK * line.slope);
    expectCheckValue(key, kelvin, 'T_K');
    expectCheckValue(key, boltzmannEvPerK * kelvin * kelvin * Math.sqrt(line.slopeVariance), 'u_T_K');
  });

  test('a common relative error drops out of the slope', () => {
    const key = 'fit.WLS_example1';
    const plain = worked(key, own);
    const common = worked(key, (inputs) => (i, j) => own(inputs)(i, j) + 4);
    expectClose(common.slope, {
      expected: plain.slope,
      rel: 1e-11,
      because: 'it shifts all ordinates alike',
    });
    expectClose(common.slopeVariance, { expected: plain.slopeVariance, rel: 1e-9, because: 'the same' });
    expectClose(common.interceptVariance, {
      expected: plain.interceptVariance + 4,
      rel: 1e-9,
      because: 'it is all there',
    });
  });
});

test('the slope is its gain times the ordinates, and the residuals are what is left', () => {
  const x = [1, 2, 4, 7];
  const y = [3, 1, 5, 2];
  const line = fit(x, y, (i, j) => (i === j ? 1 + i : 0.3));
  expect(line.slopeGain.reduce((sum, gain, i) => sum + gain * y[i]!, 0)).toBeCloseTo(line.slope, 13);
  expect(line.slopeGain.reduce((sum, gain) => sum + gain, 0)).toBeCloseTo(0, 13);
  for (const [i, residual] of line.residuals.entries()) {
    expect(residual).toBeCloseTo(y[i]! - line.intercept - line.slope * x[i]!, 13);
  }
});

test.each([
  ['all x equal', [2, 2, 2], [1, 0, 0, 0, 1, 0, 0, 0, 1]],
  ['a covariance that is not positive definite', [1, 2, 3], [1, 2, 0, 2, 1, 0, 0, 0, 1]],
  ['a single point', [1], [1]],
])('%s gives no line', (_what, x, covariance) => {
  const y = Float64Array.from(x, (_, i) => i);
  expect(fitStraightLine(Float64Array.from(x), y, Float64Array.from(covariance))).toBeNull();
});
