import { describe, expect, test } from 'vitest';
import { exp } from '../../shared-core/numeric/portable-math.ts';
import { boltzmannEvPerK } from '../../shared-core/physics/constants.ts';
import { hydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import type { SimulationInput } from '../../shared-core/simulation/simulate-recording.ts';
import { diagnoseSimulated, knownBench } from '../support/diagnose-simulated.ts';

const kelvin = 7000;
const drawCount = 150;
const alpha = hydrogenLine(3);
/** Light of a Balmer line over that of H-alpha. */
const relativeLight = (level: number): number => {
  const line = hydrogenLine(level);
  const weight =
    (line.upperWeight * line.transitionProbabilityPerS) /
    (alpha.upperWeight * alpha.transitionProbabilityPerS);
  return weight * exp((alpha.upperEnergyEv - line.upperEnergyEv) / (boltzmannEvPerK * kelvin));
};

function draw(extraLines: SimulationInput['extraLines']) {
  return Array.from({ length: drawCount }, (_, index) => {
    const { diagnosis, evidence } = diagnoseSimulated({
      bench: knownBench,
      kelvin,
      electronsPerCubicMetre: 1e19,
      seed: 21_000 + index,
      continuumElectrons: 40,
      extraLines: extraLines ?? [],
    });
    return { temperature: diagnosis.temperature, fits: evidence.fits };
  });
}

const coverageOf = (draws: ReturnType<typeof draw>): number =>
  draws.filter(({ temperature: { lowKelvin, highKelvin } }) => lowKelvin! <= kelvin && kelvin <= highKelvin!)
    .length / drawCount;

describe('what lies under the Balmer lines', () => {
  test('nothing: nothing is added in at least 98 of 100, and the D/H ratio is zero within its uncertainty', () => {
    const draws = draw([]);
    const added = draws.filter(({ fits }) => fits.companions.length > 0 || fits.deuterium!.isFitted).length;
    expect(added / drawCount).toBeLessThanOrEqual(0.02);
    const pulls = draws.map(({ fits }) => fits.deuterium!.ratio / fits.deuterium!.ratioSigma);
    const rms = Math.sqrt(pulls.reduce((sum, pull) => sum + pull * pull, 0) / drawCount);
    expect(rms).toBeGreaterThan(0.85);
    expect(rms).toBeLessThan(1.2);
    expect(Math.abs(pulls.reduce((sum, pull) => sum + pull, 0) / drawCount)).toBeLessThan(0.3);
  });

  test.each([0.01, 0.3])(
    'deuterium, D/H = %d: found every time, its ratio and the temperature covered',
    (ratio) => {
      const extra = [3, 4, 5, 6, 7].map((level) => ({
        wavelengthNm: hydrogenLine(level, 'D').wavelengthAirNm,
        relativeArea: ratio * relativeLight(level),
      }));
      const draws = draw(extra);
      let squares = 0;
      let sum = 0;
      for (const { fits } of draws) {
        expect(fits.deuterium!.isFitted).toBe(true);
        expect(fits.companions).toEqual([]);
        squares += ((fits.deuterium!.ratio - ratio) / fits.deuterium!.ratioSigma) ** 2;
        sum += fits.deuterium!.ratio;
      }
      // The simulated extra lines are as narrow as the instrument, those of the fit have Doppler width: 2 % for the strong mixture.
      expect(Math.abs(sum / drawCount / ratio - 1)).toBeLessThan(0.03);
      if (ratio < 0.1) expect(Math.sqrt(squares / drawCount)).toBeLessThan(1.2);
      expect(coverageOf(draws)).toBeGreaterThanOrEqual(0.9);
    },
  );

  test('mercury under H-gamma and calcium under H-epsilon: both fitted, areas right, temperature covered', () => {
    const draws = draw([
      { wavelengthNm: 433.922, relativeArea: 0.3 * relativeLight(5) },
      { wavelengthNm: 396.847, relativeArea: 0.5 * relativeLight(7) },
    ]);
    for (const { fits } of draws) {
      expect(fits.companions.map(({ lineId, species }) => `${species} ${lineId}`).sort()).toEqual([
        'Ca II H-epsilon',
        'Hg I H-gamma',
      ]);
      for (const { lineId, species, area } of fits.companions) {
        const host = fits.fits.find(({ id }) => id === lineId)!;
        expect(Math.abs(area / host.area - (species === 'Hg I' ? 0.3 : 0.5))).toBeLessThan(0.2);
      }
    }
    expect(coverageOf(draws)).toBeGreaterThanOrEqual(0.9);
  });
});

describe('lines beside the Balmer lines', () => {
  test('a faint one that nobody knows is fitted along, and the temperature is covered', () => {
    const extra = { wavelengthNm: 434.5, relativeArea: 0.03 * relativeLight(5) };
    const draws = draw([extra]);
    for (const { fits } of draws) {
      expect(fits.companions.map(({ species, lineId }) => `${species} ${lineId}`)).toEqual([
        'neighbour H-gamma',
      ]);
      const [neighbour] = fits.companions;
      expect(Math.abs(neighbour!.referenceNm - extra.wavelengthNm)).toBeLessThan(0.05);
      const host = fits.fits.find(({ id }) => id === 'H-gamma')!;
      expect(Math.abs(neighbour!.area / host.area / 0.03 - 1)).toBeLessThan(0.5);
    }
    expect(coverageOf(draws)).toBeGreaterThanOrEqual(0.9);
  });

  test('one far brighter than its host is masked and leaves no flank in the fit', () => {
    const draws = draw([{ wavelengthNm: 435.3, relativeArea: 8 * relativeLight(5) }]);
    for (const { fits } of draws) {
      const gamma = fits.fits.find(({ id }) => id === 'H-gamma')!;
      expect(gamma.widening).toBe(1);
    }
    expect(coverageOf(draws)).toBeGreaterThanOrEqual(0.9);
  });
});
