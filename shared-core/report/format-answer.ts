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

/** An answer taken apart, so that a page can set the value large and the rest small. */
export interface Answer {
  /** "6 210 K", "> 4 500 K" or "not determined". */
  readonly headline: string;
  /** "6 030 to 6 401 K, 95 %", or for a limit "95 %"; null when there is no number. */
  readonly interval: string | null;
}

const noAnswer: Answer = { headline: notDetermined, interval: null };

/** The temperature as value and interval, K, both to the place of the standard uncertainty; a limit keeps two digits. */
export function temperatureParts(temperature: Temperature, style: NumberStyle = 'typographic'): Answer {
  const { status, kelvin, sigmaKelvin, lowKelvin, highKelvin, coverage } = temperature;
  const coverageText = formatPercent(coverage, 1, style);
  if (status === 'lower-limit' && lowKelvin !== null)
    return { headline: `> ${limitText(lowKelvin, 'down', style)} K`, interval: coverageText };
  if (status !== 'measured' || kelvin === null || lowKelvin === null || highKelvin === null) return noAnswer;
  const place = intervalPlace({ value: kelvin, low: lowKelvin, high: highKelvin, sigma: sigmaKelvin }) ?? 0;
  const at = (each: number) => formatAtPlace(each, place, style);
  return {
    headline: `${at(kelvin)} K`,
    interval: `${at(lowKelvin)} to ${at(highKelvin)} K, ${coverageText}`,
  };
}

/**
 * The electron density as value and interval, electrons per cubic metre.
 * An interval over a decade or more gives each number two digits and a power of ten of its own.
 */
export function densityParts(density: Density, style: NumberStyle = 'typographic'): Answer {
  const { status, perCubicMetre: value, lowPerCubicMetre: low, highPerCubicMetre: high, coverage } = density;
  const unit = style === 'typographic' ? 'm⁻³' : 'm^-3';
  const coverageText = formatPercent(coverage, 1, style);
  if (status === 'upper-limit' && high !== null)
    return { headline: `< ${limitText(high, 'up', style)} ${unit}`, interval: coverageText };
  if (status !== 'measured' || value === null || value <= 0 || low === null || high === null) return noAnswer;
  const place = intervalPlace({ value, low, high, sigma: null });
  if (place === null || low <= 0 || high >= 10 * low) {
    const own = (each: number) => (each > 0 ? scientificAt(each, roundingExponent(each, 2) - 1, style) : '0');
    return {
      headline: `${own(value)} ${unit}`,
      interval: `${own(low)} to ${own(high)} ${unit}, ${coverageText}`,
    };
  }
  const exponent = exponentAtPlace(value, place);
  const power = powerOfTen(exponent, style);
  const [from, to] = [mantissaAt(low, place, exponent, style), mantissaAt(high, place, exponent, style)];
  const ends = style === 'typographic' ? `${from} to ${to}${power}` : `${from}${power} to ${to}${power}`;
  return {
    headline: `${scientificAt(value, place, style)} ${unit}`,
    interval: `${ends} ${unit}, ${coverageText}`,
  };
}

/** A density without interval, to two digits: "4.1 × 10²⁰". */
export function formatDensityNumber(perCubicMetre: number, style: NumberStyle = 'typographic'): string {
  return scientificAt(perCubicMetre, roundingExponent(perCubicMetre, 2) - 1, style);
}

/** "6 210 K (6 030 to 6 401 K, 95 %)", "> 4 500 K (95 %)" or "not determined". Kelvin. */
export function formatTemperature(temperature: Temperature, style: NumberStyle = 'typographic'): string {
  return joinedAnswer(temperatureParts(temperature, style));
}

/** "4.1 × 10²⁰ m⁻³ (3.2 to 5.1 × 10²⁰ m⁻³, 95 %)", "< 3.1 × 10¹⁹ m⁻³ (95 %)" or "not determined". */
export function formatDensity(density: Density, style: NumberStyle = 'typographic'): string {
  return joinedAnswer(densityParts(density, style));
}

function joinedAnswer({ headline, interval }: Answer): string {
  return interval === null ? headline : `${headline} (${interval})`;
}

/** The temperature that may be printed: a verdict of "not defensible" withholds a number the chain still carries. */
export function supportedTemperature(diagnosis: Diagnosis, style: NumberStyle = 'typographic'): Answer {
  return isTemperatureWithheld(diagnosis) ? noAnswer : temperatureParts(diagnosis.temperature, style);
}

/** The same in one piece of text: "6 210 K (6 030 to 6 401 K, 95 %)". */
export function temperatureAnswer(diagnosis: Diagnosis, style: NumberStyle = 'typographic'): string {
  return joinedAnswer(supportedTemperature(diagnosis, style));
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
