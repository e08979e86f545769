import { expect, test } from 'vitest';
import { createRandom } from '../../shared-core/numeric/random.ts';
import { diagnoseSimulated, knownBench } from '../support/diagnose-simulated.ts';

const lineNm = [397.0072, 410.1735, 434.0463, 486.1325, 656.2795] as const;
const relativeSigma = 0.03;
const correlationLengthNm = 80;
const drawCount = 200;

/** Errors of the response at the lines: a first-order chain in wavelength has exactly the covariance u^2 exp(-d/L). */
function drawErrors(seed: number): readonly number[] {
  const random = createRandom(seed);
  const errors: number[] = [];
  for (const [index, nm] of lineNm.entries()) {
    if (index === 0) {
      errors.push(relativeSigma * random.normal());
      continue;
    }
    const correlation = Math.exp(-(nm - lineNm[index - 1]!) / correlationLengthNm);
    errors.push(
      correlation * errors[index - 1]! + relativeSigma * Math.sqrt(1 - correlation ** 2) * random.normal(),
    );
  }
  return errors;
}

test('with a response table that is off by its stated, correlated errors the interval still holds the truth', () => {
  const kelvin = 6500;
  let covered = 0;
  let squares = 0;
  for (let index = 0; index < drawCount; index++) {
    const errors = drawErrors(40_000 + index);
    const { diagnosis } = diagnoseSimulated(
      {
        bench: knownBench,
        kelvin,
        electronsPerCubicMetre: 1e19,
        seed: 70_000 + index,
        brightestPixelElectrons: 200_000,
        continuumElectrons: 20,
        // The truth departs from the table by the drawn error of the nearest line.
        responseAt: (nm) => {
          const nearest = lineNm.reduce(
            (best, line, at) => (Math.abs(line - nm) < Math.abs(lineNm[best]! - nm) ? at : best),
            0,
          );
          return 1 + errors[nearest]!;
        },
      },
      {
        name: 'flat',
        sha256: '',
        wavelengthNm: Float64Array.from([370, 700]),
        response: Float64Array.from([1, 1]),
        relativeSigma: Float64Array.from([relativeSigma, relativeSigma]),
      },
      { ...knownBench, response: { file: 'flat', correlationLengthNm } },
    );
    const { lowKelvin, highKelvin, kelvin: found, sigmaKelvin } = diagnosis.temperature;
    if (lowKelvin! <= kelvin && kelvin <= highKelvin!) covered++;
    squares += ((1 / found! - 1 / kelvin) / (sigmaKelvin! / found! ** 2)) ** 2;
    expect(diagnosis.budget[0]!.source).toBe('spectral response');
  }
  // 200 draws: three binomial standard deviations about 95 % are 4.6 %.
  expect(covered / drawCount).toBeGreaterThan(0.904);
  expect(covered / drawCount).toBeLessThan(0.996);
  expect(Math.sqrt(squares / drawCount)).toBeGreaterThan(0.85);
  expect(Math.sqrt(squares / drawCount)).toBeLessThan(1.15);
});
