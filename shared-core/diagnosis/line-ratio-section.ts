import { lineRatios, type LineRatio } from '../populations/line-ratios.ts';
import type { Diagnosis } from './diagnosis.ts';
import { populationInput, type Evidence } from './evidence.ts';
import { plain } from './plain-number.ts';

/** Two-line temperatures of the lines in use, each with its limit at infinite temperature. */
export function lineRatioSection(evidence: Evidence): Diagnosis['lineRatios'] {
  const { temperature } = evidence;
  return lineRatios(populationInput(evidence), temperature.used, temperature.coverage).map((found) => {
    const { reason, ...numbers } = found;
    return { ...numbers, coverage: temperature.coverage, text: ratioText(found, reason) };
  });
}

function ratioText({ ratio, limit, kelvin, lowKelvin, highKelvin }: LineRatio, reason: string): string {
  const against = ratio === null ? '' : `Ratio ${plain(ratio, 4)}, limit ${plain(limit, 4)}: `;
  if (kelvin !== null) {
    return `${against}${plain(kelvin, 4)} K (${plain(lowKelvin!, 4)} to ${plain(highKelvin!, 4)} K).`;
  }
  return lowKelvin === null
    ? `${against}no temperature, ${reason}.`
    : `${against}above ${plain(lowKelvin, 3)} K, ${reason}.`;
}
