import { exp } from '../numeric/portable-math.ts';
import { boltzmannEvPerK, constants } from './constants.ts';
import { ionisationEv, sahaDensity } from './equilibrium.ts';
import { statisticalWeight } from './hydrogen.ts';

/**
 * Partition function of atomic hydrogen with levels up to n_max: Sum 2 n^2 exp(-I (1 - 1/n^2)/(k T)).
 * @param highestLevel  where the plasma cuts the series off, >= 1
 * @source definition; cut-off by the merging of the levels: [Griem1964] ch. 6
 * @check  test/reference/equilibrium.test.ts
 */
export function hydrogenPartitionFunction(kelvin: number, highestLevel: number): number {
  let sum = 0;
  for (let n = 1; n <= highestLevel; n++) {
    sum += statisticalWeight(n) * exp((-ionisationEv * (1 - 1 / (n * n))) / (boltzmannEvPerK * kelvin));
  }
  return sum;
}

/**
 * Debye length of the electrons alone, m: sqrt(eps_0 k T/(N e^2)).
 * @source [Debye1923]
 * @check  test/reference/equilibrium.test.ts
 */
export function debyeLengthM(perCubicMetre: number, kelvin: number): number {
  const { vacuumPermittivity, boltzmann, elementaryCharge } = constants;
  const charge = elementaryCharge.value;
  return Math.sqrt(
    (((vacuumPermittivity.value * boltzmann.value * kelvin) / charge) * (1 / charge)) / perCubicMetre,
  );
}

/**
 * Lowering of the ionisation energy in a plasma, eV: e/(4 pi eps_0 Debye length).
 * @source [Griem1964] ch. 6
 * @check  test/reference/equilibrium.test.ts
 */
export function ionisationLoweringEv(perCubicMetre: number, kelvin: number): number {
  const fourPi = 12.566370614359172;
  const { vacuumPermittivity, elementaryCharge } = constants;
  return elementaryCharge.value / (fourPi * vacuumPermittivity.value * debyeLengthM(perCubicMetre, kelvin));
}

/** Dissociation energy of H2, eV; rotational and vibrational quantum over k, K (from memory). */
const dissociationEv = 4.478;
const rotationKelvin = 85.3;
const vibrationKelvin = 5987;

/**
 * n(H)^2/n(H2) in equilibrium, m^-3: (pi m_H k T/h^2)^1.5 (4/Z) exp(-D/(k T)), Z = T/(2 T_rot)/(1 - exp(-T_vib/T)).
 *
 * A rigid rotor and harmonic oscillator: within 10 % of tabulated equilibria from 2000 to 5000 K. The molecular
 * constants come from memory; they decide no temperature.
 * @source [Mayer1940] ch. 9: statistical mechanics of the ideal gas
 * @check  test/reference/equilibrium.test.ts
 */
export function hydrogenDissociationDensity(kelvin: number): number {
  const { boltzmann, planck, hydrogenMass, atomicMassUnit } = constants;
  const mass = hydrogenMass.value * atomicMassUnit.value;
  const base = (3.141592653589793 * mass * boltzmann.value * kelvin) / planck.value / planck.value;
  const molecule = kelvin / (2 * rotationKelvin) / (1 - exp(-vibrationKelvin / kelvin));
  return ((base * Math.sqrt(base) * 4) / molecule) * exp(-dissociationEv / (boltzmannEvPerK * kelvin));
}

/**
 * Electron density, m^-3, of pure hydrogen in local thermodynamic equilibrium at a pressure:
 * p/(k T) = n(H2) + n(H) + 2 N_e with N_e^2/n(H) = Saha and n(H)^2/n(H2) = dissociation density.
 *
 * @param composition  'atoms' leaves molecules out; they matter below about 5000 K at atmospheric pressure
 * @source sahaDensity, hydrogenDissociationDensity
 * @check  test/reference/equilibrium.test.ts
 */
export function equilibriumElectronDensity(
  kelvin: number,
  pressurePa: number,
  composition: 'atoms' | 'molecules' = 'molecules',
): number {
  const total = pressurePa / (constants.boltzmann.value * kelvin);
  const saha = sahaDensity(kelvin);
  const inverseDissociation = composition === 'atoms' ? 0 : 1 / hydrogenDissociationDensity(kelvin);
  // In s = sqrt(n(H)) the balance s^4/K + s^2 + 2 sqrt(S) s = total is convex and rising: Newton from above never overshoots.
  const rootSaha = Math.sqrt(saha);
  let s = Math.min(Math.sqrt(total), total / (2 * rootSaha));
  for (let round = 0; round < 200; round++) {
    const square = s * s;
    const value = square * square * inverseDissociation + square + 2 * rootSaha * s - total;
    const slope = 4 * square * s * inverseDissociation + 2 * s + 2 * rootSaha;
    const next = s - value / slope;
    if (!(next < s) || s - next < 1e-14 * s) break;
    s = next;
  }
  return rootSaha * s;
}

/**
 * Time, s, in which electrons bring two levels into equilibrium: 6.3e4/(N_e f g) gap sqrt(k T) exp(gap/(k T)), N_e per
 * cm^3 and energies in eV inside the formula.
 *
 * @param oscillatorStrength  of absorption between the levels
 * @param gaunt               mean Gaunt factor, 0.1 to 0.2 for the strongest transitions
 * @source [Cristoforetti2010]; constant from memory
 * @check  test/reference/equilibrium.test.ts
 */
export function relaxationTimeS(
  perCubicMetre: number,
  kelvin: number,
  gapEv: number,
  oscillatorStrength: number,
  gaunt: number,
): number {
  const kT = boltzmannEvPerK * kelvin;
  return (6.3e10 / (perCubicMetre * oscillatorStrength * gaunt)) * gapEv * Math.sqrt(kT) * exp(gapEv / kT);
}
