import { normalQuantile } from '../numeric/distributions.ts';
import type { LineFits } from '../lines/line-fit.ts';
import type { Diagnosis } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';
import { neighbourSpecies } from '../lines/companion.ts';
import { companionWords, plainCompanions } from './companions.ts';
import { plain } from './plain-number.ts';

/** Deuterium and gas temperature count as measured at this many sigma. */
const leastDetection = 3;
/** A limit above this says nothing: in most lamps it is known to be less. */
const highestStatedFraction = 0.5;
/** A limit above this says nothing of a gas. */
const highestStatedKelvin = 1e5;

/**
 * Deuterium fraction D/(H + D) = r/(1 + r) of the fitted ratio r, with the interval of r turned over.
 * @check test/unit/diagnosis/gas.test.ts
 */
export function deuteriumSection({ fits, temperature, bench }: Evidence): Diagnosis['deuterium'] {
  const { coverage } = temperature;
  const found = fits.deuterium;
  const none = {
    fraction: null,
    sigmaFraction: null,
    lowFraction: null,
    highFraction: null,
    coverage,
  };
  if (found === null || !Number.isFinite(found.ratioSigma)) {
    const reason =
      bench.analysis?.deuterium === 'absent'
        ? 'the bench file says there is none'
        : 'no line shows it or rules it out';
    return { ...none, status: 'not-determined', text: `Deuterium is not determined: ${reason}.` };
  }
  const { ratio, ratioSigma } = found;
  const fraction = (r: number): number => Math.max(0, r) / (1 + Math.max(0, r));
  if (found.isFitted && ratio > leastDetection * ratioSigma) {
    const z = normalQuantile(0.5 * (1 + coverage));
    const value = fraction(ratio);
    return {
      status: 'measured',
      fraction: value,
      sigmaFraction: ratioSigma / ((1 + ratio) * (1 + ratio)),
      lowFraction: fraction(ratio - z * ratioSigma),
      highFraction: fraction(ratio + z * ratioSigma),
      coverage,
      text: `${plain(100 * value, 3)} % of the emitting atoms are deuterium (${plain(100 * fraction(ratio - z * ratioSigma), 3)} to ${plain(100 * fraction(ratio + z * ratioSigma), 3)} %).`,
    };
  }
  const highest = fraction(Math.max(0, ratio) + normalQuantile(coverage) * ratioSigma);
  if (highest > highestStatedFraction) {
    return {
      ...none,
      status: 'not-determined',
      text: 'Deuterium is not determined: the lines are too wide or too faint to tell it from hydrogen.',
    };
  }
  return {
    ...none,
    status: 'upper-limit',
    highFraction: highest,
    text: `No deuterium is seen: less than ${plain(100 * highest, 2)} % of the emitting atoms.`,
  };
}

/**
 * Gas temperature from the Doppler part of the widths, or its upper limit.
 * @check test/unit/diagnosis/gas.test.ts
 */
export function gasTemperatureSection({ fits, temperature }: Evidence): Diagnosis['gasTemperature'] {
  const { coverage } = temperature;
  const found = fits.gasTemperature;
  const none = { kelvin: null, lowKelvin: null, highKelvin: null, coverage };
  if (found?.isGiven === true) {
    return {
      ...none,
      status: 'given',
      kelvin: found.kelvin,
      text: `${plain(found.kelvin, 3)} K, as the bench file states.`,
    };
  }
  if (found === null || !Number.isFinite(found.kelvinSigma)) {
    return { ...none, status: 'not-determined', text: whyNoGasTemperature(fits) };
  }
  const { kelvin, kelvinSigma } = found;
  const z = normalQuantile(0.5 * (1 + coverage));
  if (kelvin > leastDetection * kelvinSigma) {
    const lowKelvin = Math.max(0, kelvin - z * kelvinSigma);
    const highKelvin = kelvin + z * kelvinSigma;
    return {
      status: 'measured',
      kelvin,
      lowKelvin,
      highKelvin,
      coverage,
      text: `${plain(kelvin, 3)} K (${plain(lowKelvin, 3)} to ${plain(highKelvin, 3)} K) from the Doppler width beyond the instrument.`,
    };
  }
  const highKelvin = Math.max(0, kelvin) + normalQuantile(coverage) * kelvinSigma;
  if (highKelvin > highestStatedKelvin) {
    return { ...none, status: 'not-determined', text: whyNoGasTemperature(fits) };
  }
  return {
    ...none,
    status: 'upper-limit',
    highKelvin,
    text: `Below ${plain(highKelvin, 2)} K: the Doppler width is hidden by the instrument.`,
  };
}

function whyNoGasTemperature({ instrumentFrom, instrumentFwhmNm }: LineFits): string {
  return instrumentFrom === 'recording'
    ? 'The instrument width is not known, so nothing can be said of the Doppler width.'
    : `An instrument width of ${plain(instrumentFwhmNm, 2)} nm hides the Doppler width.`;
}

/** Lines of other species that were fitted together with a Balmer line. */
export function companionSection({ fits, recording }: Evidence): Diagnosis['companions'] {
  const areaScale = recording.noise.gainElectronsPerCount ?? 1;
  return plainCompanions(fits).map((companion) => {
    const { lineId, species, referenceNm, area, areaSigma } = companion;
    const signalToNoise = area / areaSigma;
    const host = fits.fits.find(({ id }) => id === lineId);
    const share =
      host === undefined || !(host.area > 0) || species === neighbourSpecies
        ? ''
        : `, ${plain((100 * area) / host.area, 2)} % of its area`;
    const words = companionWords(companion);
    return {
      lineId,
      species,
      wavelengthNm: referenceNm,
      area: area * areaScale,
      areaSigma: areaSigma * areaScale,
      signalToNoise,
      text: `${words.charAt(0).toUpperCase()}${words.slice(1)}: ${plain(signalToNoise, 2)} sigma${share}.`,
    };
  });
}
