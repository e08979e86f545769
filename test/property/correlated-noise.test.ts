import { describe, expect, test } from 'vitest';
import type { Bench } from '../../shared-core/bench/bench.ts';
import { defaultAnalysisOptions, diagnose } from '../../shared-core/pipeline/diagnose.ts';
import { simulateRecording } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from '../support/diagnose-simulated.ts';

const kelvin = 7000;
const drawCount = 120;
/** The same bench when nobody measured its gain: noise from the recording, width to a third. */
const unknownBench: Bench = {
  detector: { offsetCounts: 1000, saturationCounts: 65535 },
  instrument: { fwhmNm: 0.25, fwhmSigmaNm: 0.08 },
};
const statedBench: Bench = { ...knownBench, instrument: { fwhmNm: 0.25, fwhmSigmaNm: 0.004 } };

/** Running mean as spectrometer programs apply it to an export; the ends repeat. */
const runningMean = (signal: Float64Array, points: number): Float64Array =>
  signal.map((_, i) => {
    let sum = 0;
    for (let k = -(points >> 1); k <= points >> 1; k++)
      sum += signal[Math.max(0, Math.min(signal.length - 1, i + k))]!;
    return sum / points;
  });

describe.each([
  ['gain and width stated', statedBench],
  ['neither gain nor width known', unknownBench],
] as const)('%s', (_, bench) => {
  test.each([
    [3, 240_000],
    [5, 240_000],
    [5, 4000],
  ])(
    'a running mean of %d points, brightest pixel %d electrons: the interval keeps its promise',
    (points, light) => {
      let covered = 0;
      let squares = 0;
      let named = 0;
      for (let seed = 0; seed < drawCount; seed++) {
        const { wavelengthNm, signal } = simulateRecording({
          bench: statedBench,
          kelvin,
          electronsPerCubicMetre: 1e19,
          seed: 4000 + seed,
          continuumElectrons: 40,
          brightestPixelElectrons: light,
        });
        const result = diagnose({
          recording: asRecording(wavelengthNm, runningMean(signal, points)),
          dark: null,
          response: null,
          bench,
          options: defaultAnalysisOptions,
          lineTable: [],
          programVersion: '0',
        });
        if (!result.ok) throw new Error(result.problem.code);
        const { temperature } = result.value.diagnosis;
        expect(temperature.status).toBe('measured');
        if (temperature.lowKelvin! <= kelvin && kelvin <= temperature.highKelvin!) covered++;
        squares += ((temperature.kelvin! - kelvin) / temperature.sigmaKelvin!) ** 2;
        const { fits } = result.value.evidence;
        expect(fits.correlatedNoise!.correlation.length).toBeGreaterThanOrEqual(points - 1);
        if (fits.correlatedNoise!.correlation.length === points - 1) named++;
        // Far lines would lose the root of N; lines as narrow as the mean lose a little less.
        expect(fits.correlatedNoise!.widening).toBeGreaterThan(0.75 * Math.sqrt(points));
        expect(fits.correlatedNoise!.widening).toBeLessThan(1.1 * Math.sqrt(points));
      }
      expect(named / drawCount).toBeGreaterThanOrEqual(0.95);
      // Binomial error of 120 draws: 2 %.
      expect(covered / drawCount).toBeGreaterThanOrEqual(0.89);
      const rmsPull = Math.sqrt(squares / drawCount);
      expect(rmsPull).toBeGreaterThan(0.8);
      expect(rmsPull).toBeLessThan(1.2);
    },
  );
});
