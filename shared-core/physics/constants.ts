/**
 * Physical constants, SI units where no other unit is named.
 * @source [Tiesinga2024] (CODATA 2022)
 * @check  test/reference/constants.test.ts
 */

export interface PhysicalConstant {
  readonly symbol: string;
  readonly value: number;
  readonly unit: string;
  /** In the same unit; 0 where the SI fixes the value. */
  readonly standardUncertainty: number;
  readonly source: string;
}

const codata = '2022 CODATA recommended values';
const si = 'exact by definition of the SI';
const ame = 'atomic mass evaluation AME2020, from memory';

function constant(
  symbol: string,
  value: number,
  unit: string,
  standardUncertainty: number,
  source = standardUncertainty === 0 ? si : codata,
): PhysicalConstant {
  return Object.freeze({ symbol, value, unit, standardUncertainty, source });
}

export const constants = Object.freeze({
  speedOfLight: constant('c', 299792458, 'm/s', 0),
  planck: constant('h', 6.62607015e-34, 'J s', 0),
  elementaryCharge: constant('e', 1.602176634e-19, 'C', 0),
  boltzmann: constant('k', 1.380649e-23, 'J/K', 0),
  avogadro: constant('N_A', 6.02214076e23, '1/mol', 0),
  rydberg: constant('R_inf', 10973731.568157, '1/m', 1.2e-5),
  fineStructure: constant('alpha', 7.2973525643e-3, '1', 1.1e-12),
  electronMass: constant('m_e', 9.1093837139e-31, 'kg', 2.8e-40),
  protonPerElectronMass: constant('m_p/m_e', 1836.152673426, '1', 3.2e-8),
  deuteronPerElectronMass: constant('m_d/m_e', 3670.482967655, '1', 6.3e-8),
  atomicMassUnit: constant('u', 1.66053906892e-27, 'kg', 5.2e-37),
  bohrRadius: constant('a_0', 5.29177210544e-11, 'm', 8.2e-21),
  classicalElectronRadius: constant('r_e', 2.8179403205e-15, 'm', 1.3e-24),
  vacuumPermittivity: constant('eps_0', 8.8541878188e-12, 'F/m', 1.4e-21),
  hydrogenMass: constant('m(H)', 1.0078250319, 'u', 1e-9, ame),
  deuteriumMass: constant('m(D)', 2.01410177784, 'u', 1e-9, ame),
});

const c = constants.speedOfLight.value;
const h = constants.planck.value;
const e = constants.elementaryCharge.value;
const k = constants.boltzmann.value;

/** h c, eV nm: photon energy times vacuum wavelength. */
export const photonEnergyEvNm = ((h * c) / e) * 1e9;
/** k, eV/K. */
export const boltzmannEvPerK = k / e;
/** Wavenumber of 1 eV, cm^-1. */
export const wavenumberPerEv = e / (h * c) / 100;
/** Second radiation constant h c / k, m K. */
export const secondRadiationConstantMK = (h * c) / k;
/** 2 h c^2, W m^2 sr^-1: first radiation constant for spectral radiance. */
export const firstRadiationConstant = 2 * h * c * c;

export type HydrogenIsotope = 'H' | 'D';

/** Reduced mass of electron and nucleus over the electron mass. */
export const reducedMassRatio: Readonly<Record<HydrogenIsotope, number>> = Object.freeze({
  H: 1 / (1 + 1 / constants.protonPerElectronMass.value),
  D: 1 / (1 + 1 / constants.deuteronPerElectronMass.value),
});

/** Rydberg constant of the isotope, R_inf mu/m_e, m^-1. */
export const rydbergPerM: Readonly<Record<HydrogenIsotope, number>> = Object.freeze({
  H: constants.rydberg.value * reducedMassRatio.H,
  D: constants.rydberg.value * reducedMassRatio.D,
});

/** Mass of the atom, u. */
export const atomicMassU: Readonly<Record<HydrogenIsotope, number>> = Object.freeze({
  H: constants.hydrogenMass.value,
  D: constants.deuteriumMass.value,
});
