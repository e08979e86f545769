import { describe, expect, test } from 'vitest';
import { diagnoseSimulated, knownBench } from '../support/diagnose-simulated.ts';

const kelvin = 9000;
const drawCount = 120;

/**
 * At these densities the violet lines are wider than their distances: H-epsilon stands on the wings of H-8, H-9, ..., which
 * nobody asked for but which have to be fitted along.
 */
describe.each([1e22, 5e22])('%d electrons per m3', (electronsPerCubicMetre) => {
  test('lines that run into each other still give the temperature and the density', () => {
    let covered = 0;
    let squares = 0;
    let logError = 0;
    for (let index = 0; index < drawCount; index++) {
      const { diagnosis } = diagnoseSimulated({
        bench: knownBench,
        kelvin,
        electronsPerCubicMetre,
        seed: 33_000 + index,
        continuumElectrons: 40,
        rangeNm: [350, 720],
      });
      const { temperature, electronDensity } = diagnosis;
      if (temperature.kelvin === null) continue;
      if (temperature.lowKelvin! <= kelvin && kelvin <= temperature.highKelvin!) covered++;
      squares += ((temperature.kelvin - kelvin) / temperature.sigmaKelvin!) ** 2;
      logError += Math.log(electronDensity.perCubicMetre! / electronsPerCubicMetre);
      expect(diagnosis.lines.map(({ id }) => id)).toEqual([
        'H-alpha',
        'H-beta',
        'H-gamma',
        'H-delta',
        'H-epsilon',
      ]);
    }
    expect(covered / drawCount).toBeGreaterThanOrEqual(0.9);
    expect(Math.sqrt(squares / drawCount)).toBeLessThan(1.1);
    // The simulator uses the program's own width law; what is left is the noise of the widths.
    expect(Math.abs(logError / drawCount)).toBeLessThan(0.01);
  });
});
