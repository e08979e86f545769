import { describe, expect, test } from 'vitest';
import {
  combineUncertainties,
  coverageFactor,
  type UncertaintyComponent,
} from '../../shared-core/uncertainty/gum.ts';
import { expectCheckValue } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);
const mean = (values: readonly number[]): number => sum(values) / values.length;

describe('JCGM 100:2008 (GUM), H.1: end-gauge calibration', () => {
  /** The inputs of the example in nm, K and 1/K; 50 mm gauge, expansion 11.5e-6 per K, mean departure -0.1 K. */
  const gaugeNm = 50e6;
  const component = (
    name: string,
    [standardUncertainty, sensitivity, degreesOfFreedom]: readonly [number, number, number],
  ): UncertaintyComponent => ({ name, standardUncertainty, sensitivity, degreesOfFreedom });
  const inputs = [
    component('standard', [25, 1, 18]),
    component('difference', [9.7, 1, 25.6]),
    component('difference of expansion', [0.58e-6, gaugeNm * 0.1, 50]),
    component('difference of temperature', [0.029, gaugeNm * 11.5e-6, 2]),
    component('expansion', [1.2e-6, 0, Infinity]),
    component('temperature', [0.41, 0, Infinity]),
  ];

  test('first order: 31.7 nm, 16 effective degrees of freedom, 93 nm for 99 %', () => {
    const result = combineUncertainties(inputs, 0.99);
    // The example rounds 16.675 nm to 16.6 and 31.7 to 32 on its way; the stored values follow it with the parts it prints.
    expectClose(result.standardUncertainty, { expected: 31.71, abs: 0.01, because: 'H.1.4' });
    expectClose(result.effectiveDegreesOfFreedom, { expected: 16.6, abs: 0.1, because: 'H.1.6' });
    expectCheckValue('gum.H1', result.coverageFactor, 'k99_nu16');
    expectClose(result.expandedUncertainty, { expected: 93, abs: 0.7, because: 'H.1.6, printed 93 nm' });
    expectClose(sum(result.shares), { expected: 1, rel: 1e-12, because: 'shares' });
  });

  test('with the parts as printed: the stored values', () => {
    const printed = [25, 9.7, 2.9, 16.6].map((standardUncertainty, index) => ({
      name: String(index),
      standardUncertainty,
      sensitivity: 1,
      degreesOfFreedom: [18, 25.6, 50, 2][index]!,
    }));
    const result = combineUncertainties(printed, 0.99);
    expectCheckValue('gum.H1', result.standardUncertainty, 'u_c_nm');
    expectCheckValue('gum.H1', result.effectiveDegreesOfFreedom, 'nu_eff');
    expectClose(result.expandedUncertainty, { expected: 92.5, abs: 0.05, because: 'H.1.6' });
  });

  test('second order: terms of 11.7 nm and 1.7 nm raise it to 34 nm', () => {
    const products = [
      { i: 2, j: 5, secondDerivative: -gaugeNm },
      { i: 4, j: 3, secondDerivative: -gaugeNm },
    ];
    for (const [pair, expected] of [
      [products[0]!, 11.7],
      [products[1]!, 1.7],
    ] as const) {
      const alone = combineUncertainties(
        inputs.map((each) => ({ ...each, sensitivity: 0 })),
        0.95,
        [pair],
      );
      // Printed to one decimal; 11.89 and 1.74 unrounded, the former from 0.58e-6 x 0.41 x 50e6.
      expectClose(alone.standardUncertainty, { expected, abs: 0.25, because: 'H.1.7' });
    }
    const result = combineUncertainties(inputs, 0.95, products);
    expectClose(result.standardUncertainty, { expected: 34, abs: 0.5, because: 'H.1.7, printed 34 nm' });
    expectClose(result.effectiveDegreesOfFreedom, {
      expected: combineUncertainties(inputs, 0.95).effectiveDegreesOfFreedom,
      rel: 1e-12,
      because: 'first order only',
    });
  });
});

describe('JCGM 100:2008 (GUM), H.2: resistance, reactance and impedance measured together', () => {
  // Table H.2: five readings of voltage, current and phase. From memory; they give every published figure.
  const volts = [5.007, 4.994, 5.005, 4.99, 4.999];
  const amperes = [19.663e-3, 19.639e-3, 19.64e-3, 19.685e-3, 19.678e-3];
  const radians = [1.0456, 1.0438, 1.0468, 1.0428, 1.0433];
  const readings = [volts, amperes, radians];
  const u = readings.map((values) => Math.sqrt(sum(values.map((x) => (x - mean(values)) ** 2)) / 20));
  const correlation = (a: number, b: number): number =>
    sum(readings[a]!.map((x, k) => (x - mean(readings[a]!)) * (readings[b]![k]! - mean(readings[b]!)))) /
    (20 * u[a]! * u[b]!);
  const pairs = [
    { i: 0, j: 1, correlation: correlation(0, 1) },
    { i: 0, j: 2, correlation: correlation(0, 2) },
    { i: 1, j: 2, correlation: correlation(1, 2) },
  ];
  const [V, I, phi] = readings.map(mean) as [number, number, number];
  const Z = V / I;

  test('standard uncertainties and correlations of the readings are the published ones', () => {
    for (const [index, expected] of [0.0032, 0.0095e-3, 0.00075].entries())
      expectClose(u[index]!, { expected, rel: 0.01, because: 'table H.2' });
    for (const [index, expected] of [-0.36, 0.86, -0.65].entries())
      expectClose(pairs[index]!.correlation, { expected, abs: 0.005, because: 'table H.2' });
  });

  test.each([
    [
      'R',
      Z * Math.cos(phi),
      [Math.cos(phi) / I, (-Z / I) * Math.cos(phi), -Z * Math.sin(phi)],
      127.732,
      0.071,
    ],
    [
      'X',
      Z * Math.sin(phi),
      [Math.sin(phi) / I, (-Z / I) * Math.sin(phi), Z * Math.cos(phi)],
      219.847,
      0.295,
    ],
    ['Z', Z, [1 / I, -Z / I, 0], 254.26, 0.236],
  ] as const)('%s', (_, value, sensitivities, expected, uncertainty) => {
    const result = combineUncertainties(
      sensitivities.map((sensitivity, index) => ({
        name: String(index),
        standardUncertainty: u[index]!,
        sensitivity,
        degreesOfFreedom: Infinity,
      })),
      0.95,
      pairs,
    );
    expectClose(value, { expected, abs: 0.0006, because: 'table H.4' });
    expectClose(result.standardUncertainty, { expected: uncertainty, abs: 0.0006, because: 'table H.3' });
    expectClose(sum(result.shares), { expected: 1, rel: 1e-9, because: 'covariances divided evenly' });
    expect(result.effectiveDegreesOfFreedom).toBe(Infinity);
    expectClose(result.coverageFactor, { expected: 1.959964, abs: 1e-6, because: 'normal' });
  });
});

test.each([
  [1, 0.95, 12.71],
  [2, 0.95, 4.3],
  [10, 0.95, 2.23],
  [16.9, 0.99, 2.92],
  [50, 0.9545, 2.05],
  [100, 0.95, 1.984],
  [Infinity, 0.9973, 3],
] as const)('coverage factor for %d degrees of freedom and %d is %d', (freedom, coverage, expected) => {
  // JCGM 100:2008 table G.2, printed to two or three decimals.
  expectClose(coverageFactor(coverage, freedom), { expected, abs: 0.005, because: 'table G.2' });
});

test('the coverage factor runs on into the normal one', () => {
  expectClose(coverageFactor(0.95, 10_000), {
    expected: coverageFactor(0.95, Infinity),
    rel: 2e-4,
    because: 'limit',
  });
});
