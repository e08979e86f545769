import { exp, log } from '../numeric/portable-math.ts';
import { constants } from './constants.ts';

const sqrtPiLn2 = 1.4756646266356055;
const ln2 = 0.6931471805599453;

/**
 * Absorption cross-section at the centre of a Doppler line, m^2: 2 sqrt(pi ln2) r_e f lambda^2/FWHM.
 * @param oscillatorStrength  of absorption
 * @source [Mitchell1934] ch. 3
 * @check  test/reference/self-absorption.test.ts
 */
export function dopplerCrossSectionM2(
  oscillatorStrength: number,
  wavelengthNm: number,
  dopplerFwhmNm: number,
): number {
  const lengthM = (wavelengthNm * wavelengthNm * 1e-9) / dopplerFwhmNm;
  return 2 * sqrtPiLn2 * constants.classicalElectronRadius.value * oscillatorStrength * lengthM;
}

/**
 * Share of the light at the line centre that leaves a homogeneous slab: (1 - e^-tau)/tau.
 * @check test/reference/self-absorption.test.ts
 */
export function peakEscape(opticalDepth: number): number {
  // The quotient loses digits to cancellation where the series is still exact.
  if (opticalDepth < 1e-3) {
    return 1 - (opticalDepth / 2) * (1 - (opticalDepth / 3) * (1 - opticalDepth / 4));
  }
  return (1 - exp(-opticalDepth)) / opticalDepth;
}

/**
 * Share of a Gaussian line's area that leaves a homogeneous slab: Sum (-tau)^m/((m + 1)! sqrt(m + 1)).
 * @param opticalDepth  at the centre, 0 to 10; beyond, the terms cancel to fewer than ten digits
 * @source [Ladenburg1913]
 * @check  test/reference/self-absorption.test.ts
 */
export function gaussianAreaEscape(opticalDepth: number): number {
  let term = 1;
  let sum = 1;
  for (let m = 1; m < 200 && Math.abs(term) > 1e-18; m++) {
    term *= -opticalDepth / (m + 1);
    sum += term / Math.sqrt(m + 1);
  }
  return sum;
}

/**
 * The same for a Lorentz line: e^(-tau/2) (I0(tau/2) + I1(tau/2)).
 * @param opticalDepth  at the centre, 0 to 100
 * @source [Ladenburg1913]
 * @check  test/reference/self-absorption.test.ts
 */
export function lorentzianAreaEscape(opticalDepth: number): number {
  const half = opticalDepth / 2;
  const quarterSquare = (half * half) / 4;
  let term = 1;
  let sum = 0;
  // I0 = Sum q^k/(k!)^2, I1 = (x/2) Sum q^k/(k! (k + 1)!).
  for (let k = 0; k < 500 && term > 1e-18 * sum; k++) {
    sum += term * (1 + half / (2 * (k + 1)));
    term *= quarterSquare / ((k + 1) * (k + 1));
  }
  return exp(-half) * sum;
}

/**
 * Full width at half maximum of a Gaussian line out of a homogeneous slab over that of a thin one:
 * sqrt(ln(tau/y)/ln 2), y = -ln(1 - (1 - e^-tau)/2).
 * @param opticalDepth  at the centre, > 0
 * @source half of the peak solved for the profile: [Ladenburg1913]
 * @check  test/reference/self-absorption.test.ts
 */
export function gaussianWidthRatio(opticalDepth: number): number {
  return Math.sqrt(log(opticalDepth / depthAtHalfPeak(opticalDepth)) / ln2);
}

/**
 * The same for a Lorentz line: sqrt(tau/y - 1).
 * @source [Ladenburg1913]
 * @check  test/reference/self-absorption.test.ts
 */
export function lorentzianWidthRatio(opticalDepth: number): number {
  return Math.sqrt(opticalDepth / depthAtHalfPeak(opticalDepth) - 1);
}

/** Optical depth where half of the peak's light leaves. */
function depthAtHalfPeak(opticalDepth: number): number {
  return -log(1 - (1 - exp(-opticalDepth)) / 2);
}
