import { exp } from '../numeric/portable-math.ts';
import { constants, firstRadiationConstant, secondRadiationConstantMK } from './constants.ts';

/**
 * Spectral radiance of a black body, W m^-2 sr^-1 nm^-1: (2 h c^2/lambda^5)/(exp(h c/(lambda k T)) - 1).
 * @param wavelengthNm  vacuum
 * @source [Planck1901]
 * @check  test/reference/planck.test.ts
 */
export function planckRadiance(wavelengthNm: number, kelvin: number): number {
  const m = wavelengthNm * 1e-9;
  return (
    ((firstRadiationConstant / (m * m * m * m * m)) * 1e-9) /
    (exp(secondRadiationConstantMK / (m * kelvin)) - 1)
  );
}

/**
 * The same as photons, s^-1 m^-2 sr^-1 nm^-1: (2 c/lambda^4)/(exp(h c/(lambda k T)) - 1).
 * @param wavelengthNm  vacuum
 * @source [Planck1901]
 * @check  test/reference/planck.test.ts
 */
export function planckPhotonRadiance(wavelengthNm: number, kelvin: number): number {
  const photonEnergyJ = (constants.planck.value * constants.speedOfLight.value) / (wavelengthNm * 1e-9);
  return planckRadiance(wavelengthNm, kelvin) / photonEnergyJ;
}

/**
 * d ln(radiance)/d ln(T) of a black body: x/(1 - e^-x), x = h c/(lambda k T).
 * @param wavelengthNm  vacuum
 * @source [Planck1901]
 * @check  test/reference/planck.test.ts
 */
export function planckLogSlope(wavelengthNm: number, kelvin: number): number {
  const x = secondRadiationConstantMK / (wavelengthNm * 1e-9 * kelvin);
  return x / (1 - exp(-x));
}

/**
 * Spectral emissivity of tungsten, +-0.01: piecewise linear in wavelength and temperature.
 *
 * The coefficients come from memory; the pieces join within 3e-4 and give the tabulated 0.434 at 650 nm and 2000 K.
 * @param wavelengthNm  350 to 800
 * @param kelvin        1600 to 2400; usable to 2800
 * @source data of [Larrabee1959]
 * @check  test/reference/planck.test.ts
 */
export function tungstenEmissivity(wavelengthNm: number, kelvin: number): number {
  const um = wavelengthNm * 1e-3;
  if (um < 0.45) return 0.6075 - 0.3 * um - 0.3265e-4 * kelvin + 0.59e-4 * um * kelvin;
  if (um < 0.68) return 0.4655 + 0.01558 * um + 0.2675e-4 * kelvin - 0.7305e-4 * um * kelvin;
  return 0.6552 - 0.2633 * um - 0.7333e-4 * kelvin + 0.7417e-4 * um * kelvin;
}
