import { describe, expect, test } from 'vitest';
import { defaultAnalysisOptions, diagnose } from '../../shared-core/pipeline/diagnose.ts';
import { simulateRecording } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from '../support/diagnose-simulated.ts';

const clean = (seed: number) =>
  simulateRecording({
    bench: knownBench,
    kelvin: 6000,
    electronsPerCubicMetre: 1e19,
    seed,
    brightestPixelElectrons: 200_000,
    continuumElectrons: 20,
  });

function diagnoseSignal(wavelengthNm: Float64Array, signal: Float64Array) {
  const { saturationCounts: _unknown, ...detector } = knownBench.detector!;
  const result = diagnose({
    recording: asRecording(wavelengthNm, signal),
    dark: null,
    response: null,
    bench: { ...knownBench, detector },
    options: defaultAnalysisOptions,
    lineTable: [],
    programVersion: '0.0.0',
  });
  if (!result.ok) throw new Error(result.problem.code);
  const alpha = result.value.diagnosis.lines.find(({ id }) => id === 'H-alpha')!;
  return { diagnosis: result.value.diagnosis, alpha };
}

describe('clipping at a level nobody stated', () => {
  test.each([1, 2, 3, 4, 5])('a hard ceiling is found and H-alpha left out (seed %d)', (seed) => {
    const { wavelengthNm, signal } = clean(seed);
    const ceiling = 1000 + 0.7 * (Math.max(...signal) - 1000);
    const { alpha, diagnosis } = diagnoseSignal(
      wavelengthNm,
      signal.map((value) => Math.min(value, Math.round(ceiling))),
    );
    expect(alpha.used).toBe(false);
    expect(alpha.area).toBeNull();
    expect(alpha.reasons.join()).toMatch(/clipp/);
    expect(diagnosis.verdict).not.toBe('sound');
  });

  test.each([1, 2, 3, 4, 5])('a soft ceiling that bends the top by a fifth is found (seed %d)', (seed) => {
    const { wavelengthNm, signal } = clean(seed);
    const knee = 0.5 * Math.max(...signal);
    // Compresses what lies above the knee: no two pixels are equal, and the top loses about a fifth.
    const bent = signal.map((value) => (value > knee ? Math.round(knee + 0.6 * (value - knee)) : value));
    const { alpha, diagnosis } = diagnoseSignal(wavelengthNm, bent);
    expect(alpha.used).toBe(false);
    expect(alpha.reasons.join()).toMatch(/flanks/);
    expect(diagnosis.checks.find(({ id }) => id === 'clipping')?.verdict).toBe('use with care');
  });

  test('an honest recording is not suspected in 60 draws', () => {
    for (let seed = 100; seed < 160; seed++) {
      const { wavelengthNm, signal } = clean(seed);
      const { alpha } = diagnoseSignal(wavelengthNm, signal);
      expect(alpha.used, `seed ${String(seed)}: ${alpha.reasons.join()}`).toBe(true);
    }
  });
});
