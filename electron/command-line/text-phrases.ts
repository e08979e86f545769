import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import {
  formatDensity,
  isTemperatureWithheld,
  temperatureAnswer,
} from '../../shared-core/report/format-answer.ts';

/** The temperature as screens and reports have it, in the characters of any terminal. */
export function temperaturePhrase(diagnosis: Diagnosis): string {
  const { status, responseCorrected } = diagnosis.temperature;
  const isNumber = status !== 'not-determined' && !isTemperatureWithheld(diagnosis);
  const mark = isNumber && !responseCorrected ? ', response not corrected' : '';
  return temperatureAnswer(diagnosis, 'ascii') + mark;
}

/** The electron density, with the line it was read from. */
export function densityPhrase({ electronDensity }: Diagnosis): string {
  const from = electronDensity.line === null ? '' : `, from ${electronDensity.line}`;
  return formatDensity(electronDensity, 'ascii') + from;
}
