import { describe, expect, test } from 'vitest';
import { toRecordedNm, toRegisteredNm } from '../../shared-core/axis/axis-polynomial.ts';
import { findPeaks, type Peak } from '../../shared-core/axis/find-peaks.ts';
import { registerAxis, type AxisRegistration } from '../../shared-core/axis/register-axis.ts';
import { correctRecording } from '../../shared-core/noise/correct-recording.ts';
import { createRandom } from '../../shared-core/numeric/random.ts';
import { hydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import { simulateRecording, type SimulationInput } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from '../support/diagnose-simulated.ts';

const pattern = [3, 4, 5, 6, 7].map((level) => {
  const { id, wavelengthAirNm } = hydrogenLine(level);
  return { id, referenceNm: wavelengthAirNm };
});

function register(input: Partial<SimulationInput> & { seed: number }): AxisRegistration {
  const { wavelengthNm, signal } = simulateRecording({
    bench: knownBench,
    kelvin: 6000,
    electronsPerCubicMetre: 1e19,
    continuumElectrons: 60,
    ...input,
  });
  const corrected = correctRecording(asRecording(wavelengthNm, signal), null, knownBench);
  if (!corrected.ok) throw new Error(corrected.problem.code);
  const { peaks, fwhmNm } = findPeaks(corrected.value, 0.18);
  return registerAxis(peaks, pattern, { firstNm: wavelengthNm[0]!, lastNm: wavelengthNm.at(-1)!, fwhmNm });
}

/** Largest departure of the map from the error that was put in, over the matched lines, nm. */
function worstMiss({ map }: AxisRegistration, recorded: (nm: number) => number): number {
  return Math.max(
    ...[656.28, 486.13, 434.05, 410.17].map((nm) => Math.abs(toRecordedNm(map, nm) - recorded(nm))),
  );
}

describe('an axis that is off', () => {
  test.each([0, 0.3, -0.3, 1.2, -1.2, 3, -3, 5, -5, 7, -7])(
    'by %d nm, with stretch up to 0.8 %%, is found',
    (offsetNm) => {
      for (const stretch of [-0.008, -0.003, 0, 0.003, 0.008]) {
        const recorded = (nm: number): number => nm + offsetNm + stretch * (nm - 500);
        if (Math.max(...[656.28, 486.13, 434.05].map((nm) => Math.abs(recorded(nm) - nm))) > 8.5) continue;
        const found = register({ seed: 11, recordedNm: recorded, rangeNm: [360, 710] });
        expect(found.status, `${String(offsetNm)} nm, ${String(stretch)}`).toBe('registered');
        expect(worstMiss(found, recorded)).toBeLessThan(0.03);
      }
    },
  );

  test('and bowed is followed by the quadratic term', () => {
    const recorded = (nm: number): number => nm + 0.8 + 1.5e-5 * (nm - 500) ** 2;
    const found = register({ seed: 12, recordedNm: recorded });
    expect(found.status).toBe('registered');
    expect(found.map.bowPerNm).not.toBe(0);
    expect(worstMiss(found, recorded)).toBeLessThan(0.04);
  });

  test('lines of mercury and neon, some as bright as H-beta, do not mislead it', () => {
    const extraLines = [
      404.656, 435.833, 546.074, 576.96, 579.066, 585.249, 640.225, 614.306, 607.434, 667.828,
    ].map((wavelengthNm, index) => ({ wavelengthNm, relativeArea: 0.02 + 0.02 * (index % 5) }));
    for (const offsetNm of [-4, -1, 0, 2, 6]) {
      const recorded = (nm: number): number => nm + offsetNm;
      const found = register({ seed: 13, recordedNm: recorded, extraLines });
      expect(found.status, String(offsetNm)).toBe('registered');
      expect(worstMiss(found, recorded)).toBeLessThan(0.05);
    }
  });
});

describe('no pattern to be sure of', () => {
  const heightAt = (random: ReturnType<typeof createRandom>): number => 100 / (0.02 + random.uniform());
  const randomPeaks = (seed: number, count: number): Peak[] => {
    const random = createRandom(seed);
    return Array.from({ length: count }, () => {
      const height = heightAt(random);
      return {
        recordedNm: 370 + 330 * random.uniform(),
        signalToNoise: height / 10,
        height,
        hasClipping: false,
      };
    }).sort((a, b) => b.signalToNoise - a.signalToNoise);
  };

  test.each([3, 8, 20])(
    '%d peaks at random places are taken for hydrogen in under 3 %% of 500 lists',
    (count) => {
      let wrong = 0;
      for (let seed = 0; seed < 500; seed++) {
        const found = registerAxis(randomPeaks(seed, count), pattern, {
          firstNm: 370,
          lastNm: 700,
          fwhmNm: 0.2,
        });
        if (found.status === 'registered') wrong++;
      }
      expect(wrong / 500).toBeLessThan(0.03);
    },
  );

  test('H-alpha alone names itself but registers nothing', () => {
    const alone: Peak[] = [{ recordedNm: 656.9, signalToNoise: 900, height: 5e4, hasClipping: false }];
    const found = registerAxis(alone, pattern, { firstNm: 370, lastNm: 700, fwhmNm: 0.2 });
    expect(found.status).toBe('not-found');
    expect(found.matched.map(({ id }) => id)).toEqual(['H-alpha']);
  });

  test('two readings as good as each other are called ambiguous', () => {
    // The whole pattern twice, five nanometres apart, equally strong.
    const twice = [0, 5].flatMap((shift) =>
      pattern.map(({ referenceNm }, index) => ({
        recordedNm: referenceNm + shift - 2.5,
        signalToNoise: 500 / (index + 1),
        height: 1e4 / (index + 1),
        hasClipping: false,
      })),
    );
    const found = registerAxis(twice, pattern, { firstNm: 370, lastNm: 700, fwhmNm: 0.2 });
    expect(found.status).toBe('ambiguous');
  });
});

test('the map and its inverse agree', () => {
  const map = { pivotNm: 500, offsetNm: -3.3, stretch: 0.007, bowPerNm: 2e-5 };
  for (const nm of [380, 434, 500, 656, 700]) {
    expect(toRegisteredNm(map, toRecordedNm(map, nm))).toBeCloseTo(nm, 9);
  }
});
