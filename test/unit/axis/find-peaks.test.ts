import { describe, expect, test } from 'vitest';
import { findPeaks } from '../../../shared-core/axis/find-peaks.ts';
import { correctRecording } from '../../../shared-core/noise/correct-recording.ts';
import { createRandom } from '../../../shared-core/numeric/random.ts';
import { simulateRecording } from '../../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from '../../support/diagnose-simulated.ts';

function peaksOf(wavelengthNm: Float64Array, signal: Float64Array, knownFwhmNm: number | null) {
  const corrected = correctRecording(asRecording(wavelengthNm, signal), null, knownBench);
  if (!corrected.ok) throw new Error(corrected.problem.code);
  return findPeaks(corrected.value, knownFwhmNm);
}

const bright = simulateRecording({
  bench: knownBench,
  kelvin: 6000,
  electronsPerCubicMetre: 1e19,
  seed: 8,
  continuumElectrons: 500,
});

describe('findPeaks', () => {
  test('finds the Balmer lines to a tenth of a width, the strongest first, and the width itself', () => {
    const { peaks, fwhmNm } = peaksOf(bright.wavelengthNm, bright.signal, null);
    for (const nm of [656.2795, 486.1325, 434.0463, 410.1735, 397.0072]) {
      const nearest = Math.min(...peaks.map(({ recordedNm }) => Math.abs(recordedNm - nm)));
      expect(nearest, String(nm)).toBeLessThan(0.018);
    }
    expect(Math.abs(peaks[0]!.recordedNm - 656.2795)).toBeLessThan(0.018);
    for (const [index, { signalToNoise }] of peaks.slice(1).entries()) {
      expect(signalToNoise).toBeLessThanOrEqual(peaks[index]!.signalToNoise);
    }
    // 0.18 nm instrument seen through 0.09 nm pixels.
    expect(fwhmNm).toBeGreaterThan(0.17);
    expect(fwhmNm).toBeLessThan(0.24);
  });

  test('is indifferent to a steep background', () => {
    const tilted = bright.signal.map((value, px) => value + 8 * px);
    const { peaks } = peaksOf(bright.wavelengthNm, tilted, 0.18);
    for (const nm of [656.2795, 486.1325, 434.0463, 410.1735]) {
      expect(Math.min(...peaks.map(({ recordedNm }) => Math.abs(recordedNm - nm)))).toBeLessThan(0.03);
    }
  });

  test('finds next to nothing in noise: under one false peak in a recording of 3,648 pixels', () => {
    let count = 0;
    for (let seed = 0; seed < 20; seed++) {
      const random = createRandom(seed);
      const noise = bright.signal.map(() => Math.round(1000 + 2.4 * random.normal()));
      count += peaksOf(bright.wavelengthNm, noise, 0.18).peaks.length;
    }
    expect(count / 20).toBeLessThan(1);
  });

  test('says when a peak is clipped', () => {
    const clipped = bright.signal.map((value) => Math.min(value, 20_000));
    const { peaks } = peaksOf(bright.wavelengthNm, clipped, 0.18);
    expect(peaks[0]!.hasClipping).toBe(true);
    expect(peaks[1]!.hasClipping).toBe(false);
  });

  test('does not take the shoulders of an absorption line for peaks', () => {
    const dip = simulateRecording({
      bench: knownBench,
      kelvin: 6000,
      electronsPerCubicMetre: 1e19,
      seed: 8,
      continuumElectrons: 20_000,
      backgroundAt: (nm) => -15_000 * Math.exp(-4 * Math.LN2 * ((nm - 540) / 0.25) ** 2),
    });
    const { peaks } = peaksOf(dip.wavelengthNm, dip.signal, 0.18);
    expect(peaks.filter(({ recordedNm }) => Math.abs(recordedNm - 540) < 3)).toEqual([]);
    expect(peaks.some(({ recordedNm }) => Math.abs(recordedNm - 486.13) < 0.02)).toBe(true);
  });
});
