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
  const fine = fwhmPerSigma * line.fineStructureRmsNm;
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
  const natural = naturalFwhmOf(line);
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

/** Sums of many transition probabilities; computed once a line. */
const naturalFwhmNmByLine = new Map<HydrogenLine, number>();

function naturalFwhmOf(line: HydrogenLine): number {
  let width = naturalFwhmNmByLine.get(line);
  if (width === undefined) {
    width = naturalFwhmNm(line.wavelengthVacuumNm, line.upperLevel, line.lowerLevel);
    naturalFwhmNmByLine.set(line, width);
  }
  return width;
}

function perturberNamed(gas: string | undefined): Perturber {
  const wanted = (gas ?? '').trim().toLowerCase();
  const found = Object.entries(perturbers).find(([name]) => name.toLowerCase() === wanted);
  return found?.[1] ?? perturbers.H2;
}
