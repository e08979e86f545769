import { describe, expect, test } from 'vitest';
import { correctRecording } from '../../../shared-core/noise/correct-recording.ts';
import type { CorrectedRecording } from '../../../shared-core/noise/corrected-recording.ts';
import { alignRecording } from '../../../shared-core/optical-depth/align-recording.ts';
import { asRecording } from '../../support/diagnose-simulated.ts';

const axis = (firstNm: number, count = 400): Float64Array =>
  Float64Array.from({ length: count }, (_, px) => firstNm + 0.1 * px);
const line = (nm: Float64Array): Float64Array =>
  nm.map((at) => 100 + 5000 * Math.exp(-(((at - 420) / 0.2) ** 2)));
function corrected(nm: Float64Array): CorrectedRecording {
  const result = correctRecording(asRecording(nm, line(nm)), null, {
    detector: { offsetCounts: 0, gainElectronsPerCount: 1, readNoiseElectrons: 1 },
  });
  if (!result.ok) throw new Error(result.problem.code);
  return result.value;
}
const main = corrected(axis(400));

describe('a recording of a pair', () => {
  test('stays as it is where the axes agree but for rounding', () => {
    const other = corrected(axis(400.001));
    const aligned = alignRecording(main, other, 'mirror recording');
    expect(aligned.ok && aligned.value.netSignal).toBe(other.netSignal);
    expect(aligned.ok && aligned.value.wavelengthNm).toBe(main.wavelengthNm);
    expect(aligned.ok && aligned.value.notes).toEqual(other.notes);
  });

  test.each([0.03, -0.03, 0.045, -0.045])(
    'is moved by part of a pixel, %d nm, and keeps its light',
    (shift) => {
      const aligned = alignRecording(main, corrected(axis(400 + shift)), 'mirror recording');
      if (!aligned.ok) throw new Error(aligned.problem.code);
      const { netSignal, notes } = aligned.value;
      for (let px = 2; px < 398; px++) {
        // Three points a line width carry its shape to 1.5 % of its height.
        expect(Math.abs(netSignal[px]! - main.netSignal[px]!)).toBeLessThan(75);
      }
      const sum = (values: Float64Array): number => values.slice(150, 250).reduce((a, b) => a + b, 0);
      expect(Math.abs(sum(netSignal) / sum(main.netSignal) - 1)).toBeLessThan(1e-4);
      expect(notes.at(-1)).toMatchObject({ code: 'pair-moved' });
    },
  );

  test('spreads the marks of clipped pixels over what they may touch', () => {
    const other = corrected(axis(400.04));
    const clipped = other.clipped.map((_, px) => (px === 200 ? 1 : 0));
    const aligned = alignRecording(main, { ...other, clipped }, 'mirror recording');
    if (!aligned.ok) throw new Error(aligned.problem.code);
    expect([...aligned.value.clipped].reduce((a, b) => a + b, 0)).toBe(4);
  });

  test.each([
    ['half a pixel off', axis(400.06), '400 points from 400.06'],
    ['other points', axis(400, 399), '399 points'],
  ])('with %s is refused by name', (_name, nm, found) => {
    const aligned = alignRecording(main, corrected(nm), 'mirror recording');
    expect(aligned.ok ? null : aligned.problem).toMatchObject({
      code: 'pair.axis',
      subject: 'mirror recording',
      found: expect.stringContaining(found) as string,
    });
  });
});
