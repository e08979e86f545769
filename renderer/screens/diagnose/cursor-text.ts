import type { RecordingFigure } from '../../../shared-core/diagnosis/figures.ts';
import { formatAtPlace, formatWithSigma } from '../../../shared-core/text/format-number.ts';

/** What stands under the cursor: wavelength, signal and its standard uncertainty. */
export function cursorText(figure: RecordingFigure, index: number | null): string {
  const nm = index === null ? undefined : figure.wavelengthNm[index];
  if (index === null || nm === undefined) return '';
  const signal = figure.signal[index] ?? 0;
  const sigma = figure.sigma[index] ?? null;
  const unit = figure.signalUnit === 'counts' ? ' counts' : '';
  const clipped = figure.clipped[index] === 1 ? ', clipped' : '';
  return `${formatAtPlace(nm, -3)}\u00a0nm   ${formatWithSigma(signal, sigma)}${unit}${clipped}`;
}
