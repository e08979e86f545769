import type { PeakSearch } from '../axis/find-peaks.ts';
import type { AxisRegistration } from '../axis/register-axis.ts';
import type { Bench } from '../bench/bench.ts';
import type { MeasuredProfile, WhyNoProfile } from '../instrument/measure-profile.ts';
import type { Identification } from '../identify/identify.ts';
import type { LineFit, LineFits } from '../lines/line-fit.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import type { HydrogenLine } from '../physics/hydrogen.ts';
import type { OpticalDepthFinding } from '../optical-depth/finding.ts';
import type { DrawnTemperature } from '../populations/check-by-drawing.ts';
import type { ElectronDensity } from '../populations/electron-density.ts';
import type { PopulationInput } from '../populations/pose-boltzmann.ts';
import type { SelfAbsorption } from '../populations/self-absorption.ts';
import type { TemperatureFit } from '../populations/temperature.ts';
import type { ResponseTable } from '../recording/recording.ts';
import type { Choices } from './analysis-options.ts';

/** All that the stages found, for the checks to judge. */
export interface Evidence {
  readonly recording: CorrectedRecording;
  readonly bench: Bench;
  readonly response: ResponseTable | null;
  readonly search: PeakSearch;
  readonly registration: AxisRegistration;
  readonly fits: LineFits;
  /** Of each entry of fits.fits, same order. */
  readonly fittedLines: readonly HydrogenLine[];
  readonly temperature: TemperatureFit;
  readonly density: ElectronDensity;
  readonly selfAbsorption: SelfAbsorption;
  /** Whether `temperature` is the one corrected for self-absorption. */
  readonly isSelfAbsorptionApplied: boolean;
  /** Lines left out because their level lies below the lowest equilibrated one. */
  readonly belowEquilibrium: readonly string[];
  /** The instrument's profile as a reference lamp shows it, or why it does not; null without one. */
  readonly profile: MeasuredProfile | WhyNoProfile | null;
  /** Optical depths measured with a light source or a mirror behind the tube, where that was done. */
  readonly opticalDepths: readonly OpticalDepthFinding[];
  /** The temperature by Monte Carlo; null unless it was asked for. */
  readonly drawn: DrawnTemperature | null;
  readonly choices: Choices;
  /** What else is in the tube; null where the axis could not be settled, so that nothing was looked for. */
  readonly identification: Identification | null;
  /** Ids the person switched off. */
  readonly leftOut: readonly string[];
}

/** What the stages after the line fit need of it. */
export function populationInput({ fits, fittedLines, response, bench }: Evidence): PopulationInput {
  return {
    fits,
    lines: fittedLines,
    wavelengthNm: fits.fits.map(({ referenceNm }) => referenceNm),
    response,
    bench,
  };
}

/** The fits that carry the temperature. */
export function usedFits({ fits, temperature }: Evidence): readonly LineFit[] {
  return temperature.used.map((index) => fits.fits[index]!);
}

export const listNames = (ids: readonly string[]): string =>
  ids.length < 2 ? ids.join('') : `${ids.slice(0, -1).join(', ')} and ${ids.at(-1)!}`;
