import { describe, expect, test } from 'vitest';
import type { Bench } from '../../shared-core/bench/bench.ts';
import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import { createRandom } from '../../shared-core/numeric/random.ts';
import type { SimulationInput } from '../../shared-core/simulation/simulate-recording.ts';
import { diagnoseSimulated, knownBench } from '../support/diagnose-simulated.ts';

const drawCount = 200;
const kelvin = 6300;
const responseSigma = 0.01;
const correlationLengthNm = 80;
const bench: Bench = {
  ...knownBench,
  lamp: { gasTemperatureK: 1000 },
  response: { file: 'flat.csv', correlationLengthNm },
};

/** A flat response table whose error is drawn from the covariance that it states. */
function drawTable(random: ReturnType<typeof createRandom>) {
  const stepNm = 10;
  const wavelengthNm = Float64Array.from({ length: 36 }, (_, i) => 360 + stepNm * i);
  const keep = Math.exp(-stepNm / correlationLengthNm);
  let error = random.normal();
  const response = wavelengthNm.map((_, i) => {
    if (i > 0) error = keep * error + Math.sqrt(1 - keep * keep) * random.normal();
    return 1 + responseSigma * error;
  });
  return {
    name: 'flat.csv',
    sha256: '',
    wavelengthNm,
    response,
    relativeSigma: new Float64Array(36).fill(responseSigma),
  };
}

function draws(change: Partial<SimulationInput>): readonly Diagnosis[] {
  const random = createRandom(77);
  return Array.from({ length: drawCount }, (_, index) => {
    const input = {
      bench,
      kelvin,
      electronsPerCubicMetre: 1e17,
      continuumElectrons: 40,
      seed: 1000 + index,
      ...change,
    };
    return diagnoseSimulated(input, drawTable(random)).diagnosis;
  });
}

const count = <T>(items: readonly T[], is: (item: T) => boolean): number => items.filter(is).length;

describe('H-alpha with optical depth 3', () => {
  test.each([
    ['bright', { hAlphaOpticalDepth: 3 }],
    // The deficit is about five sigma here.
    ['faint', { hAlphaOpticalDepth: 3, brightestPixelElectrons: 8000 }],
    ['dense', { hAlphaOpticalDepth: 3, electronsPerCubicMetre: 3e20 }],
  ])('%s: flagged in at least 95 % of draws, depth and corrected temperature hold the truth', (_, change) => {
    const found = draws(change).map(({ selfAbsorption }) => selfAbsorption);
    const suspected = found.filter(({ status }) => status === 'suspected');
    expect(suspected.length).toBeGreaterThanOrEqual(0.95 * drawCount);
    const settled = suspected.filter(({ opticalDepth }) => opticalDepth !== null);
    // A one per cent test of agreement refuses some draws: binomial, 200 draws, up to 3.5 %.
    expect(settled.length).toBeGreaterThanOrEqual(0.965 * suspected.length);
    const depthHeld = count(settled, ({ low, high }) => low! <= 3 && (high === null || high >= 3));
    const temperatureHeld = count(
      settled,
      ({ corrected }) =>
        corrected !== null && corrected.lowKelvin <= kelvin && corrected.highKelvin >= kelvin,
    );
    // Not sharper than stated: the Stark shape is known within limits only, which the interval allows for.
    expect(depthHeld / settled.length).toBeGreaterThanOrEqual(0.91);
    expect(temperatureHeld / settled.length).toBeGreaterThanOrEqual(0.91);
    console.info(
      `${String(suspected.length)} of ${String(drawCount)} flagged, depth held ${String(depthHeld)}, temperature held ${String(temperatureHeld)} of ${String(settled.length)}`,
    );
  });

  test('leaves a temperature that is neither sound nor called the electrons', () => {
    for (const { verdict, meaning, checks } of draws({ hAlphaOpticalDepth: 3 }).slice(0, 20)) {
      expect(verdict).not.toBe('sound');
      expect(meaning.kind).toBe('distribution-temperature');
      expect(checks.find(({ id }) => id === 'self-absorption')!.verdict).toBe('use with care');
    }
  });
});

describe('a thin tube', () => {
  test.each([
    ['bright', {}],
    ['faint', { brightestPixelElectrons: 8000, electronsPerCubicMetre: 1e19 }],
  ])('%s: false flags stay near one per cent', (_, change) => {
    const found = draws(change).map(({ selfAbsorption }) => selfAbsorption);
    const flagged = count(found, ({ status }) => status === 'suspected');
    console.info(`${String(flagged)} of ${String(drawCount)} flagged`);
    // One per cent of 200, binomial: more than 6 has a chance of half a per cent.
    expect(flagged).toBeLessThanOrEqual(6);
    expect(count(found, ({ status }) => status === 'not-testable')).toBe(0);
    // The upper limit of the depth is one-sided: it holds a thin tube always where none is seen.
    for (const { status, low, high } of found)
      if (status === 'none-seen') expect(high!).toBeGreaterThan(low!);
  });
});
