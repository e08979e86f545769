import { describe, expect, test } from 'vitest';
import { createRandom } from '../../shared-core/numeric/random.ts';
import { defaultAnalysisOptions, diagnose } from '../../shared-core/pipeline/diagnose.ts';
import { fitBoltzmann } from '../../shared-core/populations/fit-boltzmann.ts';
import { checkByDrawing } from '../../shared-core/populations/check-by-drawing.ts';
import {
  absorbedTemperatureDraws,
  inverseTemperatureDraws,
} from '../../shared-core/populations/temperature-monte-carlo.ts';
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

/** Rows of the lower Cholesky factor, row by row as in any textbook; zero rows stay zero. */
function lowerFactor(covariance: Float64Array, n: number): number[][] {
  const rows: number[][] = [];
  for (let i = 0; i < n; i++) {
    const row = new Array<number>(n).fill(0);
    for (let j = 0; j <= i; j++) {
      let rest = covariance[i * n + j]!;
      for (let k = 0; k < j; k++) rest -= row[k]! * (rows[j] ?? row)[k]!;
      row[j] = i === j ? Math.sqrt(Math.max(0, rest)) : rest === 0 ? 0 : rest / rows[j]![j]!;
    }
    rows.push(row);
  }
  return rows;
}

describe('draws of the temperature', () => {
  test.each([240_000, 4000, 1500])(
    'a draw is the fit of the drawn areas, to nine digits (%d electrons)',
    (light) => {
      const { problem, boltzmann } = lamp(light, 3).evidence.temperature;
      const n = problem!.area.length;
      // NumPy's way to draw: lower Cholesky factors by the textbook sum, each fit started anew.
      const noise = lowerFactor(problem!.areaCovariance, n);
      const relative = lowerFactor(problem!.relativeCovariance, n);
      const draw = inverseTemperatureDraws(problem!, boltzmann!, null)!;
      for (let seed = 0; seed < 50; seed++) {
        const value = draw(createRandom(seed));
        const random = createRandom(seed);
        const z = Array.from({ length: 2 * n }, () => random.normal());
        const area = problem!.area.map((mean, i) => {
          const error = noise[i]!.reduce((sum, each, k) => sum + each * z[k]!, 0);
          const factor = relative[i]!.reduce((sum, each, k) => sum + each * z[n + k]!, 0);
          return (mean + error) * Math.exp(factor);
        });
        const fit = fitBoltzmann({ ...problem!, area })!;
        expect(fit.isConverged).toBe(true);
        expect(Math.abs(value / fit.inverseKtPerEv - 1)).toBeLessThan(1e-9);
      }
    },
  );

  test('noise that was measured on few residuals draws wider tails: those of Student', () => {
    const { problem, boltzmann } = lamp(240_000, 3).evidence.temperature;
    const drawn = (freedom: number | null): number => {
      const draw = inverseTemperatureDraws(problem!, boltzmann!, freedom)!;
      const random = createRandom(9);
      const values = Float64Array.from({ length: 20_000 }, () => draw(random)).sort();
      return (values[19_500]! - values[500]!) / (2 * boltzmann!.inverseKtSigmaPerEv);
    };
    // Quantiles of the normal distribution and of Student's t with 5 degrees of freedom at 0.975.
    expect(Math.abs(drawn(null) / 1.959964 - 1)).toBeLessThan(0.03);
    expect(Math.abs(drawn(5) / 2.570582 - 1)).toBeLessThan(0.03);
  });

  test('scatter as the first order says, for a bright recording', () => {
    const { temperature } = lamp(240_000, 4).evidence;
    const draw = inverseTemperatureDraws(temperature.problem!, temperature.boltzmann!, null)!;
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

describe('draws of a temperature corrected for self-absorption', () => {
  const wavelengthNm = Float64Array.from({ length: 36 }, (_, i) => 360 + 10 * i);
  const table = {
    name: 'flat.csv',
    sha256: '',
    wavelengthNm,
    response: wavelengthNm.map(() => 1),
    relativeSigma: new Float64Array(36).fill(0.01),
  };
  const corrected = (brightestPixelElectrons: number, hAlphaOpticalDepth: number, seed: number) =>
    diagnoseSimulated(
      {
        bench: {
          ...knownBench,
          lamp: { gasTemperatureK: 1000 },
          response: { file: 'flat.csv', correlationLengthNm: 80 },
        },
        kelvin: 6300,
        electronsPerCubicMetre: 1e17,
        seed,
        brightestPixelElectrons,
        continuumElectrons: 40,
        hAlphaOpticalDepth,
      },
      table,
    ).evidence.selfAbsorption.corrected!;

  test('without errors a draw is the corrected temperature', () => {
    const { absorbed, boltzmann } = corrected(240_000, 3, 1);
    const value = absorbedTemperatureDraws(absorbed!, null)!({ ...createRandom(1), normal: () => 0 });
    // The correction frees the plot along one direction to one part in two thousand.
    expect(Math.abs(value / boltzmann!.inverseKtPerEv - 1)).toBeLessThan(1e-3);
  });

  test('a thin, bright lamp is confirmed; a thick, faint one bends too far for the first order', () => {
    const heard: number[] = [];
    const thin = checkByDrawing(corrected(240_000, 0.5, 1), 1, (trials) => heard.push(trials))!;
    expect(thin.confirmsFirstOrder).toBe(true);
    expect(heard.at(-1)).toBe(thin.trials);
    const first = corrected(8000, 3, 3);
    const thick = checkByDrawing(first, 1, () => undefined)!;
    expect(thick.reason).toBe('');
    expect(thick.confirmsFirstOrder).toBe(false);
    // Saturation of the curve of growth draws the steep side out: skewed, and a lower low end than the first order has.
    expect(thick.skewness).toBeGreaterThan(0.2);
    expect(thick.lowKelvin!).toBeLessThan(first.lowKelvin!);
    expect(thick.highKelvin!).toBeLessThan(first.highKelvin!);
  }, 120_000);

  test('where many draws have no depth it says so and gives no interval', () => {
    const check = checkByDrawing(corrected(8000, 3, 2), 1, () => undefined)!;
    expect(check).toMatchObject({
      confirmsFirstOrder: false,
      kelvin: null,
      lowKelvin: null,
      highKelvin: null,
    });
    const [, failed, all] = /^in (\d+) of (\d+) trials the depth of self-absorption had no bound$/.exec(
      check.reason,
    )!;
    // Steps that leapt to and fro for ever once lost more than a fifth of these.
    expect(Number(failed) / Number(all)).toBeLessThan(0.06);
  }, 120_000);
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
