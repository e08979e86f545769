import { exp } from '../numeric/portable-math.ts';
import { boltzmannEvPerK, constants, photonEnergyEvNm } from './constants.ts';
import { ionisationEv } from './equilibrium.ts';
import type { HydrogenLine } from './hydrogen.ts';

/** Constant of Kramers' law for free-free and free-bound emission of hydrogen, W m^3 K^0.5 Hz^-1. */
const kramersEmission = 6.8416e-51;
/** Levels summed one by one; the rest as an integral. */
const summedLevels = 200;

/**
 * Area of a Balmer line over the continuum under it in a band, in a dense hydrogen plasma in local thermodynamic
 * equilibrium; Gaunt factors 1.
 *
 * Both go with N_e N_i, so their ratio gives the temperature; only above about 1e22 m^-3, and never in a
 * low-pressure tube, whose background is the molecule's. Good to 10 to 20 %.
 * @param bandNm  width of continuum that the line is compared with
 * @source [Griem1964] ch. 13; Kramers' constant computed from the CODATA values
 * @check  test/reference/equilibrium.test.ts
 */
export function lineToContinuumRatio(line: HydrogenLine, kelvin: number, bandNm: number): number {
  const { planck, speedOfLight, electronMass, boltzmann } = constants;
  const kT = boltzmannEvPerK * kelvin;
  const lambdaM = line.wavelengthVacuumNm * 1e-9;
  const base =
    (planck.value / (6.283185307179586 * electronMass.value * boltzmann.value * kelvin)) * planck.value;
  const lineEmission =
    ((planck.value * speedOfLight.value) / lambdaM) *
    line.transitionProbabilityPerS *
    base *
    Math.sqrt(base) *
    (line.upperWeight / 2) *
    exp((ionisationEv - line.upperEnergyEv) / kT);
  let levels = 1;
  for (let n = 3; n <= summedLevels; n++) {
    levels += ((2 * ionisationEv) / (n * n * n * kT)) * exp(ionisationEv / (n * n * kT));
  }
  levels += ionisationEv / (kT * (summedLevels + 0.5) * (summedLevels + 0.5));
  const photonEv = photonEnergyEvNm / line.wavelengthVacuumNm;
  const continuum =
    ((speedOfLight.value / (lambdaM * lambdaM)) * kramersEmission * exp(-photonEv / kT) * levels) /
    Math.sqrt(kelvin);
  return lineEmission / (continuum * bandNm * 1e-9);
}
