import { describe, expect, test } from 'vitest';
import type { Bench } from '../../../shared-core/bench/bench.ts';
import { hydrogenLine } from '../../../shared-core/physics/hydrogen.ts';
import { calibrationComponents } from '../../../shared-core/populations/error-component.ts';
import { diagnoseSimulated, knownBench } from '../../support/diagnose-simulated.ts';

const table = {
  name: 'r.csv',
  sha256: '',
  wavelengthNm: Float64Array.from([360, 710]),
  response: Float64Array.from([1, 2]),
  relativeSigma: Float64Array.from([0.01, 0.01]),
};
const bench: Bench = {
  ...knownBench,
  response: {
    file: 'r.csv',
    correlationLengthNm: 80,
    lamp: { temperatureK: 2856, sigmaK: 10 },
    strayLight: { share: 0, sigma: 2e-4 },
  },
};
const simulation = {
  bench,
  kelvin: 6000,
  electronsPerCubicMetre: 1e20,
  continuumElectrons: 20,
  seed: 11,
  responseAt: (nm: number) => 1 + (nm - 360) / 350,
};

describe('components of uncertainty', () => {
  test('add up to the covariance that the fit used', () => {
    const { temperature } = diagnoseSimulated(simulation, table).evidence;
    const { ordinateCovariance } = temperature.boltzmann!;
    expect(temperature.components.map(({ id }) => id)).toEqual([
      'noise',
      'response',
      'response-lamp',
      'stray-light',
      'transition-probabilities',
      'axis',
    ]);
    for (const [at, value] of ordinateCovariance.entries()) {
      const sum = temperature.components.reduce((so, { covariance }) => so + covariance[at]!, 0);
      expect(Math.abs(sum - value)).toBeLessThan(1e-12 * ordinateCovariance[0]! + 1e-9 * Math.abs(value));
    }
  });

  test('each moves the temperature as an error of one sigma in its cause does', () => {
    const found = diagnoseSimulated(simulation, table);
    const { temperature } = found.evidence;
    const gain = temperature.boltzmann!.line.slopeGain;
    const sigmaOf = (id: string): number => {
      const { covariance } = temperature.components.find((component) => component.id === id)!;
      const n = gain.length;
      let variance = 0;
      for (let i = 0; i < n; i++)
        for (let j = 0; j < n; j++) variance += gain[i]! * gain[j]! * covariance[i * n + j]!;
      return Math.sqrt(variance) * 8.617333e-5 * temperature.kelvin! ** 2;
    };
    // The lamp 10 K hotter than the table was made for: the true response is lower where its light rose more.
    const planck = (nm: number, kelvin: number): number =>
      nm ** -4 / Math.expm1(1.4387768775e7 / (nm * kelvin));
    const rows = Array.from({ length: 351 }, (_, i) => 360 + i);
    const linear = {
      ...table,
      wavelengthNm: Float64Array.from(rows),
      response: Float64Array.from(rows, (nm) => 1 + (nm - 360) / 350),
      relativeSigma: new Float64Array(rows.length).fill(0.01),
    };
    const hotter = linear.response.map(
      (value, i) => (value * planck(rows[i]!, 2856)) / planck(rows[i]!, 2866),
    );
    const moved = diagnoseSimulated(simulation, { ...linear, response: hotter }).diagnosis.temperature
      .kelvin!;
    const still = diagnoseSimulated(simulation, linear).diagnosis.temperature.kelvin!;
    expect(Math.abs(moved - still) / sigmaOf('response-lamp')).toBeCloseTo(1, 1);
    expect(sigmaOf('stray-light')).toBeGreaterThan(1);
    expect(sigmaOf('transition-probabilities')).toBeLessThan(1);
  });

  test('only those that can act are there', () => {
    const lines = [3, 4, 5].map((level) => hydrogenLine(level));
    const wavelengthNm = lines.map(({ wavelengthAirNm }) => wavelengthAirNm);
    const ids = (given: Bench, response: typeof table | null) =>
      calibrationComponents({ lines, wavelengthNm, response, bench: given }).map(({ id }) => id);
    expect(ids(bench, null)).toEqual(['transition-probabilities']);
    expect(ids({}, table)).toEqual(['response', 'transition-probabilities', 'axis']);
  });

  test('state the cause as one number where there is one, and how well it is known', () => {
    const lines = [3, 4].map((level) => hydrogenLine(level));
    const parts = calibrationComponents({
      lines,
      wavelengthNm: lines.map(({ wavelengthAirNm }) => wavelengthAirNm),
      response: table,
      bench,
    });
    const stated = Object.fromEntries(
      parts.map(({ id, standardUncertainty, unit }) => [id, `${String(standardUncertainty)} ${unit}`]),
    );
    expect(stated['response-lamp']).toBe('10 K');
    expect(stated['axis']).toBe('0.02 nm');
    expect(stated['response']).toBe('null ');
    // W. L. Wiese, J. R. Fuhr, J. Phys. Chem. Ref. Data 38, 565 (2009): below one part in ten thousand.
    expect(stated['transition-probabilities']).toBe('0.0001 1');
  });
});
