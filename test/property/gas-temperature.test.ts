import { describe, expect, test } from 'vitest';
import type { Bench } from '../../shared-core/bench/bench.ts';
import { diagnoseSimulated, knownBench } from '../support/diagnose-simulated.ts';

const drawCount = 120;

/** Simulates a lamp of the given gas temperature and diagnoses it on a bench that does not state one. */
function draw(kelvin: number, fwhmNm: number, fwhmSigmaNm: number, pixelCount: number, seed: number) {
  const bench: Bench = { ...knownBench, instrument: { fwhmNm, fwhmSigmaNm } };
  const simulated: Bench = { ...bench, lamp: { gasTemperatureK: kelvin } };
  const { evidence } = diagnoseSimulated(
    {
      bench: simulated,
      kelvin: 7000,
      electronsPerCubicMetre: 1e17,
      seed,
      continuumElectrons: 20,
      pixelCount,
      rangeNm: [384, 660],
    },
    null,
    bench,
  );
  return evidence.fits.gasTemperature!;
}

describe('gas temperature from the Doppler widths', () => {
  test('a narrow instrument measures it: unbiased, and its uncertainty is that of its scatter', () => {
    const kelvin = 3000;
    let sum = 0;
    let squares = 0;
    for (let index = 0; index < drawCount; index++) {
      const found = draw(kelvin, 0.03, 0.0005, 24_000, 61_000 + index);
      expect(found.isGiven).toBe(false);
      const pull = (found.kelvin - kelvin) / found.kelvinSigma;
      sum += pull;
      squares += pull * pull;
      // Doppler FWHM of H-alpha at 3000 K is 25.6 pm: worth a few per cent in temperature.
      expect(found.kelvinSigma).toBeLessThan(600);
    }
    // The instrument's own uncertainty (0.5 pm) is in sigma but not in the scatter: pulls are narrower than one.
    expect(Math.abs(sum / drawCount)).toBeLessThan(0.3);
    expect(Math.sqrt(squares / drawCount)).toBeLessThan(1.15);
  });

  test('a bench instrument does not see it: the uncertainty spans all temperatures a lamp can have', () => {
    const found = draw(800, 0.18, 0.004, 3648, 62_000);
    expect(found.kelvinSigma).toBeGreaterThan(3000);
    expect(Math.abs(found.kelvin - 800)).toBeLessThan(3 * found.kelvinSigma);
  });

  test('an instrument of unknown width says nothing, and a stated temperature is taken at its word', () => {
    const silent = diagnoseSimulated({
      bench: { detector: knownBench.detector! },
      kelvin: 7000,
      electronsPerCubicMetre: 1e19,
      seed: 5,
    }).evidence.fits.gasTemperature!;
    expect(silent.kelvinSigma).toBe(Infinity);
    const stated = diagnoseSimulated({
      bench: { ...knownBench, lamp: { gasTemperatureK: 640 } },
      kelvin: 7000,
      electronsPerCubicMetre: 1e19,
      seed: 5,
    }).evidence.fits.gasTemperature!;
    expect(stated).toEqual({ kelvin: 640, kelvinSigma: 0, isGiven: true });
  });
});
