import { describe, expect, test } from 'vitest';
import { pixelAt } from '../../../shared-core/axis/pixel-at.ts';
import { chooseWindows } from '../../../shared-core/lines/choose-windows.ts';
import { jointProblemOf } from '../../support/joint-problem-of.ts';

const { recording, lines } = jointProblemOf({ seed: 31 });
const fwhm = { instrumentNm: 0.18, starkNm: 0 };
const peakAt = (recordedNm: number, signalToNoise = 50) => ({
  recordedNm,
  signalToNoise,
  height: 100,
  hasClipping: false,
});

describe('chooseWindows', () => {
  test('gives every line eight widths to either side', () => {
    const { windows, segments } = chooseWindows(recording, lines, [], fwhm);
    expect(windows.map(({ lineId }) => lineId)).toEqual(lines.map(({ id }) => id));
    const alpha = windows[0]!;
    expect(recording.wavelengthNm[alpha.endPx - 1]! - recording.wavelengthNm[alpha.firstPx]!).toBeCloseTo(
      2 * 8 * 0.18,
      1,
    );
    expect(segments).toHaveLength(5);
  });

  test('merges windows that touch into one segment with one baseline', () => {
    const { segments } = chooseWindows(recording, lines, [], { instrumentNm: 1.2, starkNm: 0 });
    expect(segments.some(({ lines: members }) => members.length > 1)).toBe(true);
    for (const [index, { firstPx }] of segments.slice(1).entries()) {
      expect(firstPx).toBeGreaterThanOrEqual(segments[index]!.endPx);
    }
  });

  test('masks a foreign peak inside a window and names one that is too near', () => {
    const inside = chooseWindows(recording, lines, [peakAt(487.0)], fwhm);
    expect(inside.masked[pixelAt(recording.wavelengthNm, 487.0)]).toBe(1);
    expect(inside.masked[pixelAt(recording.wavelengthNm, 486.13)]).toBe(0);
    expect(inside.neighbours.size).toBe(0);
    const near = chooseWindows(recording, lines, [peakAt(433.92)], fwhm);
    expect(near.neighbours.get('H-gamma')).toBe(433.92);
    const faint = chooseWindows(recording, lines, [peakAt(487.0, 5)], fwhm);
    expect(faint.masked[pixelAt(recording.wavelengthNm, 487.0)]).toBe(0);
  });

  test('leaves out a line with one clipped pixel in its core, and a line beyond the range', () => {
    const clipped = Uint8Array.from(recording.clipped);
    clipped[pixelAt(recording.wavelengthNm, 486.2)] = 1;
    const plan = chooseWindows({ ...recording, clipped }, lines, [], fwhm);
    expect(plan.obstacles.get('H-beta')).toEqual({ kind: 'clipped', clippedPixelCount: 1 });
    expect(plan.lines.map(({ id }) => id)).not.toContain('H-beta');
    const moved = lines.map((line) => ({ ...line, nominalCentreNm: line.nominalCentreNm + 43.9 }));
    expect(chooseWindows(recording, moved, [], fwhm).obstacles.get('H-alpha')).toEqual({
      kind: 'out-of-range',
    });
  });
});
