import { describe, expect, test } from 'vitest';
import type { Evidence } from '../../../shared-core/diagnosis/evidence.ts';
import {
  companionSection,
  deuteriumSection,
  gasTemperatureSection,
} from '../../../shared-core/diagnosis/gas.ts';
import type { LineFits } from '../../../shared-core/lines/line-fit.ts';
import { runDiagnosis } from '../../support/run-evidence.ts';

const { evidence } = runDiagnosis();
const withFits = (change: Partial<LineFits>): Evidence => ({
  ...evidence,
  fits: { ...evidence.fits, ...change },
});
const deuterium = (ratio: number, ratioSigma: number, isFitted = true) =>
  deuteriumSection(withFits({ deuterium: { ratio, ratioSigma, isFitted } }));

describe('deuterium fraction', () => {
  test('D/(H + D) with its interval turned over', () => {
    const found = deuterium(0.25, 0.01);
    expect(found.status).toBe('measured');
    expect(found.fraction).toBeCloseTo(0.2, 12);
    // d(r/(1 + r)) = dr/(1 + r)^2.
    expect(found.sigmaFraction).toBeCloseTo(0.01 / 1.5625, 12);
    const half = 1.959964 * 0.01;
    expect(found.lowFraction!).toBeCloseTo((0.25 - half) / (1.25 - half), 6);
    expect(found.highFraction!).toBeCloseTo((0.25 + half) / (1.25 + half), 6);
  });

  test('below three sigma a one-sided limit and no value, and never below nothing', () => {
    const found = deuterium(0.002, 0.001);
    expect(found).toMatchObject({ status: 'upper-limit', fraction: null, lowFraction: null });
    expect(found.highFraction!).toBeCloseTo((0.002 + 1.644854e-3) / (1 + 0.002 + 1.644854e-3), 9);
    expect(deuterium(-0.01, 0.001, false).highFraction!).toBeCloseTo(1.644854e-3 / 1.001644854, 9);
  });

  test('not determined when it was not looked for, or cannot be told apart', () => {
    expect(deuteriumSection(withFits({ deuterium: null })).status).toBe('not-determined');
    expect(deuterium(0, Infinity, false)).toMatchObject({ status: 'not-determined', highFraction: null });
    // A limit of more than half says nothing.
    expect(deuterium(0, 2, false)).toMatchObject({ status: 'not-determined', highFraction: null });
  });
});

describe('gas temperature', () => {
  const gas = (kelvin: number, kelvinSigma: number, isGiven = false) =>
    gasTemperatureSection(withFits({ gasTemperature: { kelvin, kelvinSigma, isGiven } }));

  test('is measured, bounded, given or not determined', () => {
    expect(gas(1000, 100)).toMatchObject({ status: 'measured', kelvin: 1000 });
    expect(gas(1000, 100).highKelvin!).toBeCloseTo(1195.9964, 3);
    const limit = gas(500, 1000);
    expect(limit).toMatchObject({ status: 'upper-limit', kelvin: null, lowKelvin: null });
    expect(limit.highKelvin!).toBeCloseTo(500 + 1644.854, 2);
    expect(gas(800, 0, true)).toMatchObject({ status: 'given', kelvin: 800 });
    expect(gas(1000, Infinity).status).toBe('not-determined');
    expect(gas(0, 1e6)).toMatchObject({ status: 'not-determined', highKelvin: null });
  });

  test('without a known instrument width the reason is that', () => {
    const found = gasTemperatureSection(
      withFits({
        instrumentFrom: 'recording',
        gasTemperature: { kelvin: 0, kelvinSigma: Infinity, isGiven: false },
      }),
    );
    expect(found.text).toContain('instrument width is not known');
  });
});

test('companions carry their area in the unit of the lines, and their share of the host', () => {
  const [found] = companionSection(
    withFits({
      companions: [{ lineId: 'H-gamma', species: 'Hg I', referenceNm: 433.922, area: 200, areaSigma: 20 }],
    }),
  );
  // The bench gives 5 electrons per count.
  expect(found).toMatchObject({ area: 1000, areaSigma: 100, signalToNoise: 10, wavelengthNm: 433.922 });
  expect(found!.text).toMatch(
    /^Light at the place of Hg I \(433\.922 nm\) was fitted together with H-gamma: 10 sigma, [\d.]+ % of its area\.$/,
  );
});
