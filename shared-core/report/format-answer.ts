import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import {
  absentMark,
  formatAtPlace,
  formatPercent,
  intervalPlace,
  mantissaAt,
  type NumberStyle,
  powerOfTen,
  scientificAt,
} from '../text/format-number.ts';
import { exponentAtPlace, roundingExponent } from '../text/decimal-digits.ts';

type Temperature = Diagnosis['temperature'];
type Density = Diagnosis['electronDensity'];

/** The words for an answer the data do not support. */
export const notDetermined = 'not determined';

/** "6 210 K (6 030 to 6 401 K, 95 %)", "> 4 500 K (95 %)" or "not determined". Kelvin. */
export function formatTemperature(temperature: Temperature, style: NumberStyle = 'typographic'): string {
  const { status, kelvin, sigmaKelvin, lowKelvin, highKelvin, coverage } = temperature;
  const coverageText = formatPercent(coverage, 1, style);
  if (status === 'lower-limit' && lowKelvin !== null)
    return `> ${limitText(lowKelvin, 'down', style)} K (${coverageText})`;
  if (status !== 'measured' || kelvin === null) return notDetermined;
  if (lowKelvin === null || highKelvin === null) return notDetermined;
  const place = intervalPlace({ value: kelvin, low: lowKelvin, high: highKelvin, sigma: sigmaKelvin }) ?? 0;
  const [value, low, high] = [kelvin, lowKelvin, highKelvin].map((each) => formatAtPlace(each, place, style));
  return `${value ?? ''} K (${low ?? ''} to ${high ?? ''} K, ${coverageText})`;
}

/**
 * "4.1 × 10²⁰ m⁻³ (3.2 to 5.1 × 10²⁰ m⁻³, 95 %)", "< 3.1 × 10¹⁹ m⁻³ (95 %)" or "not determined".
 * Electrons per cubic metre. An interval over a decade or more gives each number two digits of its own.
 */
export function formatDensity(density: Density, style: NumberStyle = 'typographic'): string {
  const { status, perCubicMetre, lowPerCubicMetre, highPerCubicMetre, coverage } = density;
  const unit = style === 'typographic' ? 'm⁻³' : 'm^-3';
  const coverageText = formatPercent(coverage, 1, style);
  if (status === 'upper-limit' && highPerCubicMetre !== null)
    return `< ${limitText(highPerCubicMetre, 'up', style)} ${unit} (${coverageText})`;
  if (status !== 'measured' || perCubicMetre === null || perCubicMetre <= 0) return notDetermined;
  if (lowPerCubicMetre === null || highPerCubicMetre === null) return notDetermined;
  const place = intervalPlace({
    value: perCubicMetre,
    low: lowPerCubicMetre,
    high: highPerCubicMetre,
    sigma: null,
  });
  if (place === null || lowPerCubicMetre <= 0 || highPerCubicMetre >= 10 * lowPerCubicMetre) {
    const [value, low, high] = [perCubicMetre, lowPerCubicMetre, highPerCubicMetre].map((each) =>
      each > 0 ? scientificAt(each, roundingExponent(each, 2) - 1, style) : '0',
    );
    return `${value ?? ''} ${unit} (${low ?? ''} to ${high ?? ''} ${unit}, ${coverageText})`;
  }
  const exponent = exponentAtPlace(perCubicMetre, place);
  const power = powerOfTen(exponent, style);
  const low = mantissaAt(lowPerCubicMetre, place, exponent, style);
  const high = mantissaAt(highPerCubicMetre, place, exponent, style);
  const ends = style === 'typographic' ? `${low} to ${high}${power}` : `${low}${power} to ${high}${power}`;
  return `${scientificAt(perCubicMetre, place, style)} ${unit} (${ends} ${unit}, ${coverageText})`;
}

/** What may be printed as the temperature: a verdict of "not defensible" withholds a number the chain still carries. */
export function temperatureAnswer(diagnosis: Diagnosis, style: NumberStyle = 'typographic'): string {
  return isTemperatureWithheld(diagnosis) ? notDetermined : formatTemperature(diagnosis.temperature, style);
}

/** True when the fit gave a number that the verdict says nobody should quote. */
export function isTemperatureWithheld(diagnosis: Diagnosis): boolean {
  return diagnosis.verdict === 'not defensible' && diagnosis.temperature.status === 'measured';
}

/** A limit keeps two digits and is rounded to the side that claims less. */
function limitText(limit: number, towards: 'up' | 'down', style: NumberStyle): string {
  if (!(limit > 0) || !Number.isFinite(limit)) return absentMark[style];
  const exponent = roundingExponent(limit, 17);
  const unit = Number(`1e${String(exponent - 1)}`);
  // A limit that is already a round number must not move a whole unit because of its last binary digit.
  const units = limit / unit;
  const nearest = Math.round(units);
  const isRound = Math.abs(units - nearest) < 1e-9;
  const whole = isRound ? nearest : towards === 'up' ? Math.ceil(units) : Math.floor(units);
  return formatAtPlace(Number(`${String(whole)}e${String(exponent - 1)}`), exponent - 1, style);
}
