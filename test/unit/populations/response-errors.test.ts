import { describe, expect, test } from 'vitest';
import {
  assumedLampKelvin,
  lampTemperatureErrors,
  strayLightErrors,
  withoutStrayLight,
} from '../../../shared-core/populations/response-errors.ts';

const table = {
  name: 'r.csv',
  sha256: '',
  wavelengthNm: Float64Array.from([400, 500, 600, 700]),
  response: Float64Array.from([1, 2, 2, 1]),
  relativeSigma: null,
};
const lamp = { temperatureK: 2856, sigmaK: 10 };

test('a hotter standard lamp: central differences of ln B by NumPy', () => {
  const errors = lampTemperatureErrors([500, 656.28, 486.13], 2856);
  expect(errors[0]!).toBeCloseTo(0.0035279735755, 10);
  expect(errors[1]!).toBeCloseTo(0.0026889908148, 10);
  // Ten kelvin tilt H-beta against H-alpha by 0.94 %.
  expect(10 * (errors[2]! - errors[1]!)).toBeCloseTo(0.0094, 4);
});

describe('stray light', () => {
  // Mean lamp counts over the table by NumPy's trapezoidal rule, over the counts at the wavelength.
  test.each([
    ['photon', 2856, 6.26634863, 0.59871028],
    ['energy', 3000, 3.98342531, 0.69450337],
  ] as const)('per %s at %d K', (per, temperatureK, blue, red) => {
    const bench = { response: { file: 'r.csv', per, lamp: { temperatureK, sigmaK: 10 } } };
    const errors = strayLightErrors(table, bench, [434, 656]);
    expect(errors[0]!).toBeCloseTo(blue, 7);
    expect(errors[1]!).toBeCloseTo(red, 7);
  });

  test('without a lamp stated takes illuminant A', () => {
    expect(assumedLampKelvin).toBe(2856);
    const stated = strayLightErrors(table, { response: { file: 'r.csv', lamp } }, [434]);
    expect([...strayLightErrors(table, { response: { file: 'r.csv' } }, [434])]).toEqual([...stated]);
  });

  test('is taken out of the table: what a lamp with stray light on every pixel would have written comes back', () => {
    const share = 0.001;
    const bench = { response: { file: 'r.csv', lamp, strayLight: { share, sigma: 0 } } };
    // The recorded counts hold the stray light, and so does their mean: true = recorded - share x mean recorded.
    const errors = strayLightErrors(table, bench, [400, 500, 600, 700]);
    const corrected = withoutStrayLight(table, bench);
    for (const [i, value] of corrected.response.entries()) {
      expect(value).toBeCloseTo(table.response[i]! * (1 - share * errors[i]!), 14);
    }
    expect(corrected.response[0]! / table.response[0]!).toBeLessThan(0.99);
    expect(withoutStrayLight(table, {})).toBe(table);
  });
});
