import { describe, expect, test } from 'vitest';
import { createRandom } from '../../shared-core/numeric/random.ts';
import { defaultAnalysisOptions, diagnose } from '../../shared-core/pipeline/diagnose.ts';
import { fitBoltzmann } from '../../shared-core/populations/fit-boltzmann.ts';
import { inverseTemperatureDraws } from '../../shared-core/populations/temperature-monte-carlo.ts';
import { simulateRecording } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, diagnoseSimulated, knownBench } from '../support/diagnose-simulated.ts';

const lamp = (brightestPixelElectrons: number, seed: number) =>
  diagnoseSimulated({
    bench: knownBench,
    kelvin: 7000,
    electronsPerCubicMetre: 1e19,
    seed,
    brightestPixelElectrons,
    continuumElectrons: 20,
  });

describe('draws of the temperature', () => {
  test('a draw is the fit of the drawn areas, to nine digits', () => {
    const { problem, boltzmann } = lamp(240_000, 3).evidence.temperature;
    const draw = inverseTemperatureDraws(problem!, boltzmann!)!;
    const errors = Array.from({ length: 10 }, (_, i) => 1.5 * Math.sin(i + 1));
    let at = 0;
    const value = draw({ ...createRandom(1), normal: () => errors[at++]! });
    // Noise only: independent of each other as far as the Cholesky factor of the joint fit's covariance says.
    const none = draw({ ...createRandom(1), normal: () => 0 });
    expect(Math.abs(none / fitBoltzmann(problem!)!.inverseKtPerEv - 1)).toBeLessThan(1e-9);
    expect(value).not.toBe(none);
  });

  test('scatter as the first order says, for a bright recording', () => {
    const { temperature } = lamp(240_000, 4).evidence;
    const draw = inverseTemperatureDraws(temperature.problem!, temperature.boltzmann!)!;
    const random = createRandom(5);
    const values = Array.from({ length: 4000 }, () => draw(random));
    const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
    const sigma = Math.sqrt(
      values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1),
    );
    expect(Math.abs(mean / temperature.boltzmann!.inverseKtPerEv - 1)).toBeLessThan(1e-3);
    expect(sigma / temperature.boltzmann!.inverseKtSigmaPerEv).toBeGreaterThan(0.95);
    expect(sigma / temperature.boltzmann!.inverseKtSigmaPerEv).toBeLessThan(1.05);
  });
});

describe('the check by Monte Carlo', () => {
  const run = (brightestPixelElectrons: number, seed: number, monteCarloSeed: number) => {
    const { wavelengthNm, signal } = simulateRecording({
      bench: knownBench,
      kelvin: 7000,
      electronsPerCubicMetre: 1e19,
      seed,
      brightestPixelElectrons,
      continuumElectrons: 20,
    });
    const heard: number[] = [];
    const result = diagnose({
      recording: asRecording(wavelengthNm, signal),
      dark: null,
      response: null,
      bench: knownBench,
      options: { ...defaultAnalysisOptions, monteCarlo: { seed: monteCarloSeed } },
      lineTable: [],
      programVersion: '0',
      onTrials: (trials) => heard.push(trials),
    });
    if (!result.ok) throw new Error(result.problem.code);
    return { diagnosis: result.value.diagnosis, heard };
  };

  test('confirms a bright recording, tells its progress, and gives the same trials for the same seed', () => {
    const { diagnosis, heard } = run(240_000, 11, 1);
    const { monteCarlo, temperature } = diagnosis;
    expect(monteCarlo!.confirmsFirstOrder).toBe(true);
    expect(monteCarlo!.isStable).toBe(true);
    expect(heard.at(-1)).toBe(monteCarlo!.trials);
    expect(heard.every((trials, index) => index === 0 || trials > heard[index - 1]!)).toBe(true);
    expect(Math.abs(monteCarlo!.lowKelvin! - temperature.lowKelvin!)).toBeLessThan(
      0.1 * temperature.sigmaKelvin!,
    );
    expect(run(240_000, 11, 1).diagnosis.monteCarlo).toEqual(monteCarlo);
    expect(run(240_000, 11, 2).diagnosis.monteCarlo!.lowKelvin).not.toBe(monteCarlo!.lowKelvin);
  });

  test('where it does not confirm, the temperature carries its interval, and the truth stays covered', () => {
    let covered = 0;
    let replaced = 0;
    const count = 40;
    for (let seed = 0; seed < count; seed++) {
      const { monteCarlo, temperature } = run(800, 900 + seed, 1).diagnosis;
      if (temperature.kelvin === null) continue;
      if (
        !monteCarlo!.confirmsFirstOrder &&
        monteCarlo!.lowKelvin !== null &&
        monteCarlo!.highKelvin !== null
      ) {
        replaced++;
        expect(temperature.lowKelvin).toBe(monteCarlo!.lowKelvin);
        expect(temperature.text).toContain('Monte Carlo');
      }
      if (temperature.lowKelvin! <= 7000 && 7000 <= temperature.highKelvin!) covered++;
    }
    expect(replaced).toBeGreaterThan(0);
    // Binomial error of 40 draws: 3.4 %.
    expect(covered / count).toBeGreaterThanOrEqual(0.85);
  }, 60_000);

  test('is silent unless asked for, and says nothing where there is no temperature', () => {
    expect(lamp(240_000, 12).diagnosis.monteCarlo).toBeNull();
    const random = createRandom(3);
    const wavelengthNm = Float64Array.from({ length: 2000 }, (_, i) => 370 + 0.165 * i);
    const result = diagnose({
      recording: asRecording(
        wavelengthNm,
        wavelengthNm.map(() => Math.round(1000 + 3 * random.normal())),
      ),
      dark: null,
      response: null,
      bench: knownBench,
      options: { ...defaultAnalysisOptions, monteCarlo: { seed: 1 } },
      lineTable: [],
      programVersion: '0',
    });
    expect(result.ok && result.value.diagnosis.monteCarlo).toBeNull();
  });
});
