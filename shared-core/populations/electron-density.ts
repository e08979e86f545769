import { normalQuantile } from '../numeric/distributions.ts';
import { exp } from '../numeric/portable-math.ts';
import { voigtFwhmNm } from '../numeric/voigt-pixel.ts';
import type { LineFit, LineFits } from '../lines/line-fit.ts';
import {
  electronDensityFromHAlpha,
  electronDensityFromHBeta,
  hAlphaStarkRelativeSigma,
  hBetaStarkRelativeSigma,
} from '../physics/stark.ts';

export interface ElectronDensity {
  readonly status: 'measured' | 'upper-limit' | 'not-determined';
  readonly reason: string;
  readonly perCubicMetre: number | null;
  readonly lowPerCubicMetre: number | null;
  readonly highPerCubicMetre: number | null;
  readonly line: string | null;
  /** Stark width and its uncertainty, nm, after instrument, Doppler, fine structure and van der Waals parts. */
  readonly starkFwhmNm: number | null;
  readonly starkFwhmSigmaNm: number | null;
}

/** Below this the width law is a long extrapolation, so no limit is stated under it. */
export const lowestStatedDensity = 1e19;
const leastDetection = 3;
const leastLineSignificance = 10;
/**
 * Share of the instrument width by which its true shape may mimic a Lorentz width, 1 sigma: real profiles are no
 * Gaussians (common practice: a Stark width is not claimed until it widens the line by about 2 %).
 */
const profileShapeShare = 0.02;
/** Van der Waals widths are good to about 30 % (Griem's constant and Lindholm-Foley's differ by 17 %). */
const vanDerWaalsRelativeSigma = 0.3;

/**
 * Electron density from the Stark width of H-beta, or of H-alpha where H-beta cannot be used.
 *
 * The fit has already taken out the instrument (with its uncertainty), Doppler and fine structure as the Gaussian
 * part; natural and van der Waals widths are subtracted here, Lorentz from Lorentz. A width below three sigma, or an
 * instrument width that was itself read off the recording, gives an upper limit.
 *
 * @param beforehandNm  nm: natural plus van der Waals FWHM of each fit, by line id
 * @source [Gigosos2003]
 * @check  test/property/density-coverage.test.ts
 */
export function electronDensity(
  fits: LineFits,
  beforehandNm: ReadonlyMap<string, number>,
  coverage: number,
): ElectronDensity {
  const usable = (id: string): LineFit | undefined =>
    fits.fits.find(
      (fit) =>
        fit.id === id && fit.status === 'converged' && fit.area > leastLineSignificance * fit.areaSigma,
    );
  const beta = usable('H-beta');
  const line = beta ?? usable('H-alpha');
  if (line === undefined) {
    return {
      ...nothing,
      status: 'not-determined',
      reason: 'neither H-beta nor H-alpha is strong enough and unclipped',
    };
  }
  const law =
    line === beta
      ? { density: electronDensityFromHBeta, relativeSigma: hBetaStarkRelativeSigma }
      : { density: electronDensityFromHAlpha, relativeSigma: hAlphaStarkRelativeSigma };
  const known = beforehandNm.get(line.id) ?? 0;
  const knownSigma = vanDerWaalsRelativeSigma * known;
  const starkFwhmNm = line.lorentzianFwhmNm - known;
  const shapeSigma = profileShapeShare * fits.instrumentFwhmNm;
  const starkFwhmSigmaNm = Math.sqrt(
    line.lorentzianFwhmSigmaNm * line.lorentzianFwhmSigmaNm +
      knownSigma * knownSigma +
      shapeSigma * shapeSigma,
  );
  const widths = { line: line.id, starkFwhmNm, starkFwhmSigmaNm };
  const oneSided = normalQuantile(coverage);

  if (fits.instrumentFrom === 'recording') {
    // Nothing separates instrument from Stark broadening: the whole width bounds it.
    const whole = voigtFwhmNm(line.gaussianFwhmNm, Math.max(0, line.lorentzianFwhmNm));
    return {
      ...nothing,
      ...widths,
      status: 'upper-limit',
      reason: 'the instrument width is not known, so the whole width of the line bounds the Stark width',
      highPerCubicMetre: Math.max(
        lowestStatedDensity,
        law.density(whole * exp(oneSided * law.relativeSigma)),
      ),
    };
  }
  if (starkFwhmNm < leastDetection * starkFwhmSigmaNm) {
    const highest = Math.max(0, starkFwhmNm) + oneSided * starkFwhmSigmaNm;
    return {
      ...nothing,
      ...widths,
      status: 'upper-limit',
      reason: 'the Stark width is hidden by the instrument',
      highPerCubicMetre: Math.max(
        lowestStatedDensity,
        law.density(highest * exp(oneSided * law.relativeSigma)),
      ),
    };
  }
  const z = normalQuantile(0.5 * (1 + coverage));
  const relative = starkFwhmSigmaNm / starkFwhmNm;
  const spread = exp(z * Math.sqrt(relative * relative + law.relativeSigma * law.relativeSigma));
  return {
    ...widths,
    status: 'measured',
    reason: '',
    perCubicMetre: law.density(starkFwhmNm),
    lowPerCubicMetre: law.density(starkFwhmNm / spread),
    highPerCubicMetre: law.density(starkFwhmNm * spread),
  };
}

const nothing = Object.freeze({
  perCubicMetre: null,
  lowPerCubicMetre: null,
  highPerCubicMetre: null,
  line: null,
  starkFwhmNm: null,
  starkFwhmSigmaNm: null,
});
