import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import { densityText, kelvinText } from './text-numbers.ts';

/** "6 210 K (6 030 to 6 401, 95 %)", "above 9 400 K (95 %)" or "not determined". */
export function temperaturePhrase({ temperature }: Diagnosis): string {
  const { status, kelvin, sigmaKelvin, lowKelvin, highKelvin } = temperature;
  if (status === 'measured' && kelvin !== null) {
    const high = highKelvin === null ? 'no upper end' : kelvinText(highKelvin, sigmaKelvin);
    const interval =
      lowKelvin === null
        ? ''
        : ` (${kelvinText(lowKelvin, sigmaKelvin)} to ${high}, ${percent(temperature)})`;
    const mark = temperature.responseCorrected ? '' : ', not corrected for the response';
    return `${kelvinText(kelvin, sigmaKelvin)} K${interval}${mark}`;
  }
  if (status === 'lower-limit' && lowKelvin !== null) {
    return `above ${kelvinText(lowKelvin, null)} K (${percent(temperature)})`;
  }
  return 'not determined';
}

/** "4.1e20 per m3 (3.2e20 to 5.1e20, 95 %)", "below 3.0e19 per m3 (95 %)" or "not determined". */
export function densityPhrase({ electronDensity }: Diagnosis): string {
  const { status, perCubicMetre, lowPerCubicMetre, highPerCubicMetre, line } = electronDensity;
  const from = line === null ? '' : `, from ${line}`;
  if (status === 'measured' && perCubicMetre !== null) {
    const interval =
      lowPerCubicMetre === null || highPerCubicMetre === null
        ? ''
        : ` (${densityText(lowPerCubicMetre)} to ${densityText(highPerCubicMetre)}, ${percent(electronDensity)})`;
    return `${densityText(perCubicMetre)} per m3${interval}${from}`;
  }
  if (status === 'upper-limit' && highPerCubicMetre !== null) {
    return `below ${densityText(highPerCubicMetre)} per m3 (${percent(electronDensity)})${from}`;
  }
  return 'not determined';
}

const percent = ({ coverage }: { readonly coverage: number }): string =>
  `${String(Math.round(1000 * coverage) / 10)} %`;
