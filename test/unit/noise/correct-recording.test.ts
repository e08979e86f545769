import { describe, expect, test } from 'vitest';
import { correctRecording } from '../../../shared-core/noise/correct-recording.ts';
import { simulateDark, simulateRecording } from '../../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from '../../support/diagnose-simulated.ts';

const { wavelengthNm, signal } = simulateRecording({
  bench: knownBench,
  kelvin: 6000,
  electronsPerCubicMetre: 1e19,
  seed: 3,
});
const recording = asRecording(wavelengthNm, signal);
const darkOf = (frameCount: number) => {
  const dark = simulateDark({ bench: knownBench, seed: 9 }, frameCount);
  return asRecording(dark.wavelengthNm, dark.signal);
};

function correct(...args: Parameters<typeof correctRecording>) {
  const result = correctRecording(...args);
  if (!result.ok) throw new Error(result.problem.code);
  return result.value;
}

describe('correctRecording', () => {
  test('removes the offset of the bench file when no dark is given, and says so', () => {
    const { netSignal, darkUsed, notes, noise } = correct(recording, null, knownBench);
    expect(netSignal[100]).toBe(signal[100]! - 1000);
    expect(darkUsed).toBe('offset');
    expect(notes.map(({ code }) => code)).toContain('dark-offset');
    // Read noise 12 electrons at 5 a count, plus the twelfth of a count of whole numbers.
    expect(noise.fixedVariance[0]).toBeCloseTo((12 / 5) ** 2 + 1 / 12, 12);
    expect(noise.variancePerSignal).toBeCloseTo(0.2, 12);
    expect(noise.origin).toBe('bench');
  });

  test('subtracts a dark pixel by pixel and adds the noise of that dark: all of a single frame, little of sixteen', () => {
    const single = correct(recording, darkOf(1), knownBench).noise.fixedVariance[2000]!;
    const averaged = correct(recording, darkOf(16), knownBench).noise.fixedVariance[2000]!;
    const alone = correct(recording, null, knownBench).noise.fixedVariance[2000]!;
    expect(single / alone).toBeGreaterThan(1.85);
    expect(single / alone).toBeLessThan(2.05);
    expect(averaged / alone).toBeGreaterThan(1.04);
    expect(averaged / alone).toBeLessThan(1.1);
  });

  test('measures the noise where the bench gives no gain, and leaves areas in counts', () => {
    const { noise, notes } = correct(recording, null, { detector: { offsetCounts: 1000 } });
    expect(noise.origin).toBe('estimated');
    expect(noise.gainElectronsPerCount).toBeNull();
    expect(Math.sqrt(noise.fixedVariance[0]!)).toBeGreaterThan(2.2);
    expect(Math.sqrt(noise.fixedVariance[0]!)).toBeLessThan(2.8);
    expect(notes.map(({ code }) => code)).toContain('noise-estimated');
  });

  test('refuses a dark of another length, with both lengths in the facts', () => {
    const short = asRecording(wavelengthNm.slice(0, 100), signal.slice(0, 100));
    const result = correctRecording(recording, short, knownBench);
    expect(result.ok).toBe(false);
    if (result.ok) return;
    expect(result.problem.code).toBe('dark.length');
    expect(result.problem.expected).toContain('3648 points');
    expect(result.problem.found).toBe('100 points');
  });

  test('puts pixel edges half way between centres', () => {
    const { edgeNm } = correct(recording, null, knownBench);
    expect(edgeNm).toHaveLength(3649);
    expect(edgeNm[1]).toBeCloseTo((wavelengthNm[0]! + wavelengthNm[1]!) / 2, 12);
    expect(edgeNm[0]! + edgeNm[1]!).toBeCloseTo(2 * wavelengthNm[0]!, 9);
  });
});
