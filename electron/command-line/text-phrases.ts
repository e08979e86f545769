import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import {
  formatDensity,
  formatTemperature,
  isTemperatureWithheld,
  notDetermined,
} from '../../shared-core/report/format-answer.ts';

/** The temperature as screens and reports have it, in the characters of any terminal. */
export function temperaturePhrase(diagnosis: Diagnosis): string {
  const { temperature } = diagnosis;
  if (temperature.status === 'not-determined' || isTemperatureWithheld(diagnosis)) return notDetermined;
  const mark = temperature.responseCorrected ? '' : ', response not corrected';
  return formatTemperature(temperature, 'ascii') + mark;
}

/** The electron density, with the line it was read from. */
export function densityPhrase({ electronDensity }: Diagnosis): string {
  const from = electronDensity.line === null ? '' : `, from ${electronDensity.line}`;
  return formatDensity(electronDensity, 'ascii') + from;
}
