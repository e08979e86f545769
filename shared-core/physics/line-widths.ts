import { dopplerFwhmNm, naturalFwhmNm, perturbers, vanDerWaalsFwhmNm, type Perturber } from './broadening.ts';
import { atomicMassU } from './constants.ts';
import type { HydrogenLine } from './hydrogen.ts';

/** What the widths need to know of a lamp; the lamp of a bench file fits it. */
export interface LampConditions {
  readonly gas?: string | undefined;
  readonly pressurePa?: number | undefined;
  readonly gasTemperatureK?: number | undefined;
}

/**
 * Gas temperature assumed when the bench does not say, K: the middle, on a logarithmic scale, of what hydrogen
 * discharges from cooled tubes (300 K) to microwave plasmas (3000 K) show. Common practice, from memory.
 */
export const defaultGasTemperatureK = 1000;

const fwhmPerSigma = 2.3548200450309493;

/** Intensity-weighted rms spread of the fine-structure components, pm, for n = 3, 4, 5. */
const fineStructureRmsPm = [6.763, 3.931, 3.206];
/**
 * The same in cm^-1 for n >= 6. The splitting of the lower level (2p doublet, 0.3659 cm^-1) dominates: in wavenumbers
 * the spread rises 0.157, 0.166, 0.170 for n = 3, 4, 5 and tends to 0.174. Within 2 % for every n above 5.
 */
const fineStructureRmsPerCm = 0.174;

/**
 * Rms spread of the fine-structure components of a Balmer line, nm.
 * @source Dirac energies and line strengths of all components, sublevels populated by weight
 * @check  test/reference/line-widths.test.ts
 */
export function fineStructureRmsNm({ upperLevel, wavelengthVacuumNm }: HydrogenLine): number {
  const tabulated = fineStructureRmsPm[upperLevel - 3];
  if (tabulated !== undefined) return tabulated * 1e-3;
  return fineStructureRmsPerCm * wavelengthVacuumNm * wavelengthVacuumNm * 1e-7;
}

/**
 * Squared FWHM, nm^2, that temperature and fine structure add to the Gaussian part of a line:
 * Doppler^2 + (2.3548 rms)^2.
 *
 * Treating the fine structure as a Gaussian holds for instruments wider than 0.05 nm.
 * @param lamp  gas temperature; defaultGasTemperatureK when absent
 * @check test/reference/line-widths.test.ts
 */
export function thermalFwhmSquaredNm2(line: HydrogenLine, lamp: LampConditions): number {
  const kelvin = lamp.gasTemperatureK ?? defaultGasTemperatureK;
  const doppler = dopplerFwhmNm(line.wavelengthVacuumNm, kelvin, atomicMassU[line.isotope]);
  const fine = fwhmPerSigma * fineStructureRmsNm(line);
  return doppler * doppler + fine * fine;
}

/**
 * Lorentz FWHM, nm, that a line has before any Stark broadening: natural plus van der Waals.
 *
 * Natural only when the pressure is not known. A gas without an entry of its own is taken as hydrogen. Resonance
 * broadening is left out, for it needs the degree of dissociation, which no bench knows; at full dissociation it is
 * up to twice the van der Waals width.
 * @check test/reference/line-widths.test.ts
 */
export function lorentzianBeforehandNm(line: HydrogenLine, lamp: LampConditions): number {
  const natural = naturalFwhmNm(line.wavelengthVacuumNm, line.upperLevel, line.lowerLevel);
  if (lamp.pressurePa === undefined) return natural;
  const vanDerWaals = vanDerWaalsFwhmNm(
    line.wavelengthVacuumNm,
    line.upperLevel,
    atomicMassU[line.isotope],
    perturberNamed(lamp.gas),
    lamp.pressurePa,
    lamp.gasTemperatureK ?? defaultGasTemperatureK,
  );
  return natural + vanDerWaals;
}

function perturberNamed(gas: string | undefined): Perturber {
  const wanted = (gas ?? '').trim().toLowerCase();
  const found = Object.entries(perturbers).find(([name]) => name.toLowerCase() === wanted);
  return found?.[1] ?? perturbers.H2;
}
