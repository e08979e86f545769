import type { Recording } from './recording.ts';

/**
 * A recording as plain CSV: one header line, then wavelength (nm) and signal with a decimal point.
 * Numbers are written with the fewest digits that read back as the same double.
 */
export function recordingToCsv(recording: Pick<Recording, 'wavelengthNm' | 'signal'>): string {
  const { wavelengthNm, signal } = recording;
  const lines = ['wavelength_nm,signal_counts'];
  for (let i = 0; i < wavelengthNm.length; i += 1)
    lines.push(`${String(wavelengthNm[i])},${String(signal[i])}`);
  return `${lines.join('\n')}\n`;
}
