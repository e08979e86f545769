import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { fail, ok, type Result } from '../result/result.ts';

/** Axes that agree to this part of a pixel are the same but for rounding. */
const sameShare = 0.02;
const largestShare = 0.5;

/**
 * A recording on the pixels of the main one: as it is where the axes agree, moved by four-point interpolation where they
 * differ by less than half a pixel (which keeps the light of a line), else a Problem.
 *
 * @source [DLMF2024] 3.3: Lagrange interpolation
 * @check  test/unit/optical-depth/align-recording.test.ts
 */
export function alignRecording(
  main: Pick<CorrectedRecording, 'name' | 'wavelengthNm' | 'edgeNm'>,
  other: CorrectedRecording,
  subject: string,
): Result<CorrectedRecording> {
  const { wavelengthNm, edgeNm } = main;
  const n = wavelengthNm.length;
  const range = (nm: Float64Array): string =>
    `${String(nm.length)} points from ${nm[0]!.toFixed(2)} to ${nm.at(-1)!.toFixed(2)} nm`;
  let largest = 0;
  if (other.wavelengthNm.length === n) {
    for (let px = 0; px < n; px++) {
      const off = Math.abs(other.wavelengthNm[px]! - wavelengthNm[px]!) / (edgeNm[px + 1]! - edgeNm[px]!);
      largest = Math.max(largest, off);
    }
  }
  if (other.wavelengthNm.length !== n || largest >= largestShare) {
    return fail({
      code: 'pair.axis',
      subject,
      fileName: other.name,
      lineNumber: null,
      expected: `the axis of "${main.name}" to half a pixel, ${range(wavelengthNm)}`,
      found: range(other.wavelengthNm),
      remedy: 'Record both with the same spectrometer settings.',
    });
  }
  if (largest < sameShare) return ok({ ...other, wavelengthNm, edgeNm });
  const netSignal = new Float64Array(n);
  const clipped = new Uint8Array(n);
  for (let px = 0; px < n; px++) {
    // Pixel numbers of the other recording that lie about this wavelength.
    const step = px + (other.wavelengthNm[px]! > wavelengthNm[px]! ? -1 : 0);
    const first = Math.max(0, Math.min(n - 4, step - 1));
    netSignal[px] = interpolate(other.wavelengthNm, other.netSignal, first, wavelengthNm[px]!);
    for (let k = first; k < first + 4; k++) if (other.clipped[k] === 1) clipped[px] = 1;
  }
  const shifted = `"${other.name}" was moved by up to ${largest.toFixed(2)} pixels onto the axis of "${main.name}".`;
  return ok({
    ...other,
    wavelengthNm,
    edgeNm,
    netSignal,
    clipped,
    notes: [...other.notes, { code: 'pair-moved', text: shifted }],
  });
}

/** Lagrange's cubic through four points. */
function interpolate(x: Float64Array, y: Float64Array, first: number, at: number): number {
  let sum = 0;
  for (let i = first; i < first + 4; i++) {
    let term = y[i]!;
    for (let j = first; j < first + 4; j++) if (j !== i) term *= (at - x[j]!) / (x[i]! - x[j]!);
    sum += term;
  }
  return sum;
}
