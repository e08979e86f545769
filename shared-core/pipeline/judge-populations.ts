import type { Bench } from '../bench/bench.ts';
import type { Choices } from '../diagnosis/analysis-options.ts';
import { normalQuantile } from '../numeric/distributions.ts';
import type { LineFits } from '../lines/line-fit.ts';
import { lowestEquilibratedLevel } from '../physics/equilibrium.ts';
import type { HydrogenLine } from '../physics/hydrogen.ts';
import {
  defaultGasTemperatureK,
  lorentzianBeforehandNm,
  type LampConditions,
} from '../physics/line-widths.ts';
import {
  electronDensity,
  lowestStatedDensity,
  type ElectronDensity,
} from '../populations/electron-density.ts';
import { coversNm } from '../populations/response-at.ts';
import {
  judgeSelfAbsorption,
  type AbsorbingGas,
  type SelfAbsorption,
} from '../populations/self-absorption.ts';
import { fitTemperature, type TemperatureFit, type TemperatureInput } from '../populations/temperature.ts';
import type { ResponseTable } from '../recording/recording.ts';

export interface PopulationQuestion {
  readonly fits: LineFits;
  readonly fittedLines: readonly HydrogenLine[];
  readonly response: ResponseTable | null;
  readonly bench: Bench;
  readonly choices: Choices;
  readonly leftOut: readonly string[];
  readonly coverage: number;
  readonly whyNoFits: string | null;
}

export interface JudgedPopulations {
  readonly temperature: TemperatureFit;
  readonly density: ElectronDensity;
  /** The gas that absorbs, as far as it is known. */
  readonly gas: AbsorbingGas;
  readonly selfAbsorption: SelfAbsorption;
  /** Whether `temperature` is the one corrected for self-absorption. */
  readonly isSelfAbsorptionApplied: boolean;
  /** Lines left out because their level lies below the lowest equilibrated one. */
  readonly belowEquilibrium: readonly string[];
}

/** From areas and widths to temperature and density, in the order in which the choices build on each other. */
export function judgePopulations(question: PopulationQuestion): JudgedPopulations {
  const { fits, fittedLines, response, bench, choices, coverage } = question;
  const barred = new Set(question.leftOut);
  for (const { id, referenceNm } of fits.fits) {
    if (response !== null && !coversNm(response, referenceNm)) barred.add(id);
  }
  const input: TemperatureInput = {
    fits,
    lines: fittedLines,
    wavelengthNm: fits.fits.map(({ referenceNm }) => referenceNm),
    barred,
    response,
    bench,
    coverage,
    widening: choices.widening,
    whyNoFits: question.whyNoFits,
  };
  const beforehand = new Map(
    fittedLines.map((line) => [line.id, lorentzianBeforehandNm(line, bench.lamp ?? {})]),
  );
  const density = electronDensity(fits, beforehand, coverage);
  const plain = fitTemperature(input);
  const equilibrated = choices.levels === 'all' ? null : withoutLowLevels(input, plain, density);
  const temperature = equilibrated?.temperature ?? plain;
  const gas: AbsorbingGas = {
    lamp: absorbingLamp(bench, fits),
    electrons: absorbingElectrons(density, coverage),
  };
  const selfAbsorption = judgeSelfAbsorption(input, temperature, gas);
  const isSelfAbsorptionApplied = choices.selfAbsorption === 'correct' && selfAbsorption.corrected !== null;
  return {
    temperature: isSelfAbsorptionApplied ? selfAbsorption.corrected : temperature,
    density,
    gas,
    selfAbsorption,
    isSelfAbsorptionApplied,
    belowEquilibrium: equilibrated?.leftOut ?? [],
  };
}

/** The plot without the levels that the density does not hold in equilibrium; null when two lines would not remain. */
function withoutLowLevels(
  input: TemperatureInput,
  plain: TemperatureFit,
  density: ElectronDensity,
): { readonly temperature: TemperatureFit; readonly leftOut: readonly string[] } | null {
  if (plain.kelvin === null || density.lowPerCubicMetre === null) return null;
  const lowest = lowestEquilibratedLevel(density.lowPerCubicMetre, plain.kelvin);
  if (lowest === null) return null;
  const leftOut = plain.used
    .map((index) => input.fits.fits[index]!)
    .filter(({ upperLevel }) => upperLevel < lowest)
    .map(({ id }) => id);
  if (leftOut.length === 0) return null;
  const temperature = fitTemperature({ ...input, barred: new Set([...input.barred, ...leftOut]) });
  return temperature.boltzmann === null ? null : { temperature, leftOut };
}

/** Gas temperature and pressure of the absorbing atoms: as stated, else from the widths, else the usual one. */
function absorbingLamp({ lamp }: Bench, { gasTemperature }: LineFits): LampConditions {
  if (lamp?.gasTemperatureK !== undefined) return lamp;
  const isSeen = gasTemperature !== null && gasTemperature.kelvin > 3 * gasTemperature.kelvinSigma;
  return { ...lamp, gasTemperatureK: isSeen ? gasTemperature.kelvin : defaultGasTemperatureK };
}

/** Electrons that widen the absorbing lines: as measured, else a Stark width anywhere below its limit. */
function absorbingElectrons(density: ElectronDensity, coverage: number): AbsorbingGas['electrons'] {
  const { perCubicMetre, lowPerCubicMetre, highPerCubicMetre } = density;
  if (perCubicMetre !== null && lowPerCubicMetre !== null && highPerCubicMetre !== null) {
    return {
      low: lowPerCubicMetre,
      middle: perCubicMetre,
      high: highPerCubicMetre,
      halfRange: normalQuantile(0.5 * (1 + coverage)),
    };
  }
  const limit = highPerCubicMetre ?? lowestStatedDensity;
  // A quarter of the limit's width (widths go with about the two-thirds power of the density), half of it either way: where
  // the Stark width is hidden it usually lies far below its limit, and seldom at it.
  return { low: 0, middle: 0.13 * limit, high: limit, halfRange: 1 };
}
