import { exp } from '../numeric/portable-math.ts';
import { dopplerFwhmNm } from '../physics/broadening.ts';
import { atomicMassU, boltzmannEvPerK } from '../physics/constants.ts';
import { fineStructureComponents } from '../physics/fine-structure.ts';
import { hydrogenLine, type HydrogenLine } from '../physics/hydrogen.ts';
import {
  defaultGasTemperatureK,
  lorentzianBeforehandNm,
  thermalFwhmSquaredNm2,
} from '../physics/line-widths.ts';
import { starkWidthOfLine } from '../physics/stark.ts';
import { absorptionStrength, atomicProfile, lostLight } from './lost-light.ts';
import { simulationDefaults, type SimulationInput } from './simulation-input.ts';

/** One Voigt profile of a simulated recording. */
export interface SimulatedProfile {
  /** Line it belongs to. */
  readonly id: string;
  readonly centreNm: number;
  readonly gaussianFwhmNm: number;
  readonly lorentzianFwhmNm: number;
  /** Photons times response, one scale for all; negative for light that the tube keeps. */
  readonly relativeArea: number;
}

/** Balmer lines up to this level are put in, whether analysed or not: the series goes on in a real tube. */
const highestLevel = 12;
/** Instruments narrower than this see fine-structure components, wider ones a blend. */
const fineStructureShowsBelowNm = 0.05;

/** Everything that emits between the two wavelengths, nm, in the order in which it is added up. */
export function simulatedProfiles(
  input: SimulationInput,
  firstNm: number,
  lastNm: number,
): readonly SimulatedProfile[] {
  const instrument = input.bench.instrument?.fwhmNm ?? simulationDefaults.instrumentFwhmNm;
  const inRange = (line: HydrogenLine): boolean =>
    inMedium(input, line) >= firstNm - 2 && inMedium(input, line) <= lastNm + 2;
  const lines = Array.from({ length: highestLevel - 2 }, (_, index) => hydrogenLine(index + 3)).filter(
    inRange,
  );
  const profiles = lines.flatMap((line) => lineProfiles(input, line, 1));
  const ratio = input.deuteriumRatio ?? 0;
  if (ratio > 0)
    for (const { upperLevel } of lines)
      profiles.push(...lineProfiles(input, hydrogenLine(upperLevel, 'D'), ratio));
  for (const [index, extra] of (input.extraLines ?? []).entries()) {
    const host = hydrogenLine(extra.relativeTo ?? 3);
    profiles.push({
      id: `extra-${String(index + 1)}`,
      centreNm: extra.wavelengthNm,
      gaussianFwhmNm: instrument,
      lorentzianFwhmNm: 0,
      relativeArea: photonsOf(input, host, inMedium(input, host)) * extra.relativeArea,
    });
  }
  return throughInstrument(profiles, instrument, input.bench.instrument?.lorentzShare ?? 0);
}

const inMedium = ({ bench }: SimulationInput, line: HydrogenLine): number =>
  bench.axis?.medium === 'vacuum' ? line.wavelengthVacuumNm : line.wavelengthAirNm;

/** One isotope's line: the light it emits, less what the tube keeps of it. */
function lineProfiles(
  input: SimulationInput,
  line: HydrogenLine,
  abundance: number,
): readonly SimulatedProfile[] {
  const emitted = emittedProfiles(input, line, abundance);
  const depth = input.hAlphaOpticalDepth ?? 0;
  if (depth === 0) return emitted;
  const instrument = input.bench.instrument?.fwhmNm ?? simulationDefaults.instrumentFwhmNm;
  const kelvin = input.bench.lamp?.gasTemperatureK ?? defaultGasTemperatureK;
  const alpha = hydrogenLine(3);
  const { peakPerNm } = atomicProfile(alpha, kelvin, lorentzianFwhmNmOf(input, alpha));
  const depthNm = ((depth / peakPerNm) * abundance * absorptionStrength(line)) / absorptionStrength(alpha);
  const whole = emitted.reduce((sum, { relativeArea }) => sum + relativeArea, 0);
  const profile = atomicProfile(line, kelvin, lorentzianFwhmNmOf(input, line));
  return [
    ...emitted,
    ...lostLight(profile, depthNm, instrument / 8).map(({ shiftNm, fwhmNm, share }) => ({
      id: line.id,
      centreNm: inMedium(input, line) + shiftNm,
      gaussianFwhmNm: Math.sqrt(instrument * instrument + fwhmNm * fwhmNm),
      lorentzianFwhmNm: 0,
      relativeArea: -whole * share,
    })),
  ];
}

/** Natural, pressure and Stark widths together. */
const lorentzianFwhmNmOf = (
  { bench, electronsPerCubicMetre, starkFactorOf }: SimulationInput,
  line: HydrogenLine,
): number =>
  lorentzianBeforehandNm(line, bench.lamp ?? {}) +
  (starkFactorOf?.(line.upperLevel) ?? 1) * starkWidthOfLine(line.upperLevel, electronsPerCubicMetre);

/** One line as one profile, or one a fine-structure component where the instrument is narrow. */
function emittedProfiles(input: SimulationInput, line: HydrogenLine, abundance: number): SimulatedProfile[] {
  const { bench } = input;
  const instrument = bench.instrument?.fwhmNm ?? simulationDefaults.instrumentFwhmNm;
  const nm = inMedium(input, line);
  const lorentzianFwhmNm = lorentzianFwhmNmOf(input, line);
  const relativeArea = abundance * photonsOf(input, line, nm);
  if (instrument >= fineStructureShowsBelowNm) {
    const gaussianFwhmNm = Math.sqrt(instrument * instrument + thermalFwhmSquaredNm2(line, bench.lamp ?? {}));
    return [{ id: line.id, centreNm: nm, gaussianFwhmNm, lorentzianFwhmNm, relativeArea }];
  }
  const kelvin = bench.lamp?.gasTemperatureK ?? defaultGasTemperatureK;
  const doppler = dopplerFwhmNm(line.wavelengthVacuumNm, kelvin, atomicMassU[line.isotope]);
  return fineStructureComponents(line.upperLevel, line.lowerLevel, line.isotope).map(
    ({ wavenumberPerCm, share }) => ({
      id: line.id,
      centreNm: nm + 1e7 / wavenumberPerCm - line.wavelengthVacuumNm,
      gaussianFwhmNm: Math.sqrt(instrument * instrument + doppler * doppler),
      lorentzianFwhmNm,
      relativeArea: relativeArea * share,
    }),
  );
}

/** Light of a line before the tube absorbs any of it: response x weight x transition probability x population. */
function photonsOf(
  { responseAt, populationOf, kelvin }: SimulationInput,
  line: HydrogenLine,
  nm: number,
): number {
  const lowest = hydrogenLine(3);
  const population =
    populationOf?.(line.upperLevel) ??
    exp((lowest.upperEnergyEv - hydrogenLine(line.upperLevel).upperEnergyEv) / (boltzmannEvPerK * kelvin));
  return (responseAt?.(nm) ?? 1) * line.upperWeight * line.transitionProbabilityPerS * population;
}

/** A pseudo-Voigt instrument shows every profile twice: through its Gaussian and through its Lorentzian. */
function throughInstrument(
  profiles: readonly SimulatedProfile[],
  instrumentNm: number,
  lorentzShare: number,
): readonly SimulatedProfile[] {
  if (lorentzShare === 0) return profiles;
  return profiles.flatMap((profile) => {
    const own = profile.gaussianFwhmNm * profile.gaussianFwhmNm - instrumentNm * instrumentNm;
    return [
      { ...profile, relativeArea: (1 - lorentzShare) * profile.relativeArea },
      {
        ...profile,
        gaussianFwhmNm: Math.sqrt(Math.max(own, 1e-8)),
        lorentzianFwhmNm: profile.lorentzianFwhmNm + instrumentNm,
        relativeArea: lorentzShare * profile.relativeArea,
      },
    ];
  });
}
