import { describe, expect, test } from 'vitest';
import { hydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import { runDiagnosis, type Run } from '../support/run-evidence.ts';

const drawCount = 200;
const boltzmannEvPerK = 8.617333e-5;

/** Sum of two Boltzmann distributions; `coolShare` of level 3 belongs to the cooler one. */
const twoTemperatures =
  (coolShare: number, coolKelvin: number, hotKelvin: number) =>
  (level: number): number => {
    const energyEv = hydrogenLine(level).upperEnergyEv - hydrogenLine(3).upperEnergyEv;
    const part = (kelvin: number): number => Math.exp(-energyEv / (boltzmannEvPerK * kelvin));
    return coolShare * part(coolKelvin) + (1 - coolShare) * part(hotKelvin);
  };

const draws = (run: Run) =>
  Array.from(
    { length: drawCount },
    (_, index) => runDiagnosis({ ...run, simulation: { ...run.simulation, seed: 40_000 + index } }).diagnosis,
  );

describe('populations of two temperatures', () => {
  // A bright recording with a response known to one per cent, correlated over 80 nm.
  test.each([
    [0.95, 3000, 12_000, 1e17],
    [0.9, 3000, 12_000, 1e17],
    [0.9, 3000, 12_000, 3e20],
    [0.5, 3000, 12_000, 1e17],
    [0.2, 3000, 12_000, 1e17],
    [0.97, 3000, 12_000, 1e17],
  ])(
    'share %d at %d K in %d K, %d electrons: sound in at most 5 %',
    (share, cool, hot, electronsPerCubicMetre) => {
      const found = draws({
        simulation: { electronsPerCubicMetre, populationOf: twoTemperatures(share, cool, hot) },
      });
      const sound = found.filter(({ verdict }) => verdict === 'sound').length;
      const electrons = found.filter(({ meaning }) => meaning.kind === 'electron-temperature').length;
      console.info(
        `sound ${String(sound)}, called electron temperature ${String(electrons)} of ${String(drawCount)}`,
      );
      expect(sound).toBeLessThanOrEqual(0.05 * drawCount);
      expect(electrons).toBeLessThanOrEqual(0.05 * drawCount);
    },
  );
});

/**
 * Balmer ratios to H-beta in energy at 10 000 K: P. J. Storey, D. G. Hummer, Mon. Not. R. Astron. Soc. 272, 41 (1995),
 * Table for case B; electrons per cm^3.
 */
const recombination = [
  ['1e2', [2.86316, 1, 0.46834, 0.25895, 0.15903, 0.10502]],
  ['1e6', [2.80637, 1, 0.47147, 0.26231, 0.16295, 0.10972]],
  ['1e10', [2.62402, 1, 0.51926, 0.32487, 0.23159, 0.17742]],
] as const;

describe('a recombining gas', () => {
  test.each(recombination)(
    'of %s electrons per cm^3 is never called an electron temperature',
    (density, ratios) => {
      const found = draws({
        simulation: {
          electronsPerCubicMetre: 1e6 * Number(density),
          populationOf: (level) => {
            const line = hydrogenLine(level);
            const ratio = ratios[level - 3] ?? 0;
            return (ratio * line.wavelengthVacuumNm) / (line.upperWeight * line.transitionProbabilityPerS);
          },
        },
      });
      expect(found.filter(({ meaning }) => meaning.kind === 'electron-temperature')).toEqual([]);
      for (const { meaning } of found) expect(meaning.text).toContain('recombining gas');
    },
  );
});
