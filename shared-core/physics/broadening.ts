import { pow } from '../numeric/portable-math.ts';
import { constants, reducedMassRatio, rydbergPerM } from './constants.ts';
import { oscillatorStrength, statisticalWeight, transitionProbabilityPerS } from './hydrogen.ts';

const pi = 3.141592653589793;
const eightLn2 = 5.545177444479562;

/**
 * Doppler FWHM, nm: lambda sqrt(8 ln2 k T / m) / c.
 * @param kelvin  kinetic temperature of the emitting atom
 * @source [Griem1997] sec. 4.2
 * @check  test/reference/broadening.test.ts
 */
export function dopplerFwhmNm(wavelengthNm: number, kelvin: number, massU: number): number {
  const { boltzmann, atomicMassUnit, speedOfLight } = constants;
  const squaredSpeed = (eightLn2 * boltzmann.value * kelvin) / (massU * atomicMassUnit.value);
  return (wavelengthNm * Math.sqrt(squaredSpeed)) / speedOfLight.value;
}

/**
 * Natural FWHM of upper -> lower, nm: lambda^2/(2 pi c) (Gamma_u + Gamma_l), each Gamma the sum of the averaged
 * transition probabilities downwards, Lyman lines escaping.
 * @check test/reference/broadening.test.ts
 */
export function naturalFwhmNm(wavelengthNm: number, upper: number, lower: number): number {
  let ratePerS = 0;
  for (let n = 1; n < upper; n++) ratePerS += transitionProbabilityPerS(upper, n);
  for (let n = 1; n < lower; n++) ratePerS += transitionProbabilityPerS(lower, n);
  return angularToNm(ratePerS, wavelengthNm);
}

/** An atom or molecule that disturbs the emitter. */
export interface Perturber {
  /** Angstrom^3, static; values from memory. */
  readonly polarisabilityA3: number;
  readonly massU: number;
}

export const perturbers = Object.freeze({
  // 9/2 a_0^3, exact for an infinitely heavy nucleus.
  H: { polarisabilityA3: 0.667, massU: 1.00783 },
  H2: { polarisabilityA3: 0.8045, massU: 2.016 },
  D2: { polarisabilityA3: 0.795, massU: 4.028 },
  He: { polarisabilityA3: 0.205, massU: 4.0026 },
  Ne: { polarisabilityA3: 0.396, massU: 20.1797 },
  Ar: { polarisabilityA3: 1.6411, massU: 39.948 },
  N2: { polarisabilityA3: 1.74, massU: 28.0134 },
} satisfies Record<string, Perturber>);

/**
 * Van der Waals FWHM of a Balmer line (nd -> 2p), nm.
 *
 * Delta omega = 8.08 C6^(2/5) v^(3/5) N, C6 = e^2 a0^2 alpha (R_u^2 - R_l^2)/(4 pi eps0 hbar),
 * R^2 = (n^2/2)(5 n^2 + 1 - 3 l (l + 1)), v = sqrt(8 k T/(pi mu)), N = p/(k T).
 * Good to about 30 %: another dispersion average in use gives 17 % more.
 *
 * @source Lindholm-Foley: [Griem1964] ch. 4; constant 8.08 from memory
 * @check  test/reference/broadening.test.ts
 */
export function vanDerWaalsFwhmNm(
  wavelengthNm: number,
  upper: number,
  emitterMassU: number,
  perturber: Perturber,
  pressurePa: number,
  kelvin: number,
): number {
  const { elementaryCharge, bohrRadius, vacuumPermittivity, planck, boltzmann, atomicMassUnit } = constants;
  const hbar = planck.value / (2 * pi);
  const charge = elementaryCharge.value;
  const polarisability = perturber.polarisabilityA3 * 1e-30;
  const spread = squaredRadius(upper, 2) - squaredRadius(2, 1);
  const c6 =
    (charge * charge * bohrRadius.value * bohrRadius.value * polarisability * spread) /
    (4 * pi * vacuumPermittivity.value * hbar);
  const reducedMassU = (emitterMassU * perturber.massU) / (emitterMassU + perturber.massU);
  const speed = Math.sqrt((8 * boltzmann.value * kelvin) / (pi * reducedMassU * atomicMassUnit.value));
  const perCubicMetre = pressurePa / (boltzmann.value * kelvin);
  return angularToNm(8.08 * pow(c6, 0.4) * pow(speed, 0.6) * perCubicMetre, wavelengthNm);
}

/** Mean squared radius of the state n, l in units of a_0^2. */
function squaredRadius(n: number, l: number): number {
  return ((n * n) / 2) * (5 * n * n + 1 - 3 * l * (l + 1));
}

/**
 * Resonance FWHM of a Balmer line, nm: (3/4 pi) r_e lambda^2 Sum lambda_R f_R sqrt(g_1/g_R) N, summed over the Lyman
 * lines of lower and upper level. Good to about 20 %.
 * @param groundStatePerCubicMetre  hydrogen atoms in the ground state
 * @source [Ali1965]; form of [Laux2003]
 * @check  test/reference/broadening.test.ts
 */
export function resonanceFwhmNm(
  wavelengthNm: number,
  upper: number,
  groundStatePerCubicMetre: number,
): number {
  const sum = [2, upper]
    .map((n) => {
      const lymanM = 1 / (rydbergPerM.H * (1 - 1 / (n * n)));
      return (
        ((lymanM * oscillatorStrength(1, n)) / reducedMassRatio.H) *
        Math.sqrt(statisticalWeight(1) / statisticalWeight(n))
      );
    })
    .reduce((total, part) => total + part, 0);
  const wavelengthM = wavelengthNm * 1e-9;
  return (
    (3 / (4 * pi)) *
    constants.classicalElectronRadius.value *
    wavelengthM *
    wavelengthM *
    sum *
    groundStatePerCubicMetre *
    1e9
  );
}

/** Width in angular frequency (s^-1) to width in wavelength (nm): lambda^2/(2 pi c). */
function angularToNm(perS: number, wavelengthNm: number): number {
  const wavelengthM = wavelengthNm * 1e-9;
  return ((wavelengthM * wavelengthM) / (2 * pi * constants.speedOfLight.value)) * perS * 1e9;
}
