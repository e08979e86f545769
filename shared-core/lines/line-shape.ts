import { gaussianFwhmPerSigma } from '../numeric/voigt-run.ts';
import {
  gasIndex,
  instrumentIndex,
  lineBase,
  offsetIndex,
  starkIndex,
  stretchIndex,
  type JointLine,
  type JointProblem,
} from './joint-problem.ts';

/** Centre and widths of one line at given parameter values, nm on the recorded axis. */
export interface LineShape {
  readonly centreNm: number;
  /** Instrument, Doppler and fine structure together. */
  readonly gaussianFwhmNm: number;
  /** Broadening inside the lamp; may be slightly negative within its uncertainty. */
  readonly lorentzianFwhmNm: number;
}

export function lineShape(problem: JointProblem, values: Float64Array, index: number): LineShape {
  const line = problem.lines[index]!;
  const instrument = values[instrumentIndex]! * (1 + values[lineBase(index) + 3]!);
  return {
    centreNm: centreNm(problem, values, index),
    gaussianFwhmNm: Math.sqrt(instrument * instrument + ownSquaredNm2(line, values[gasIndex]!)),
    lorentzianFwhmNm: lorentzianFwhmNm(line, values, index),
  };
}

export function centreNm(problem: JointProblem, values: Float64Array, index: number): number {
  return sharedCentreNm(problem, values, problem.lines[index]!) + values[lineBase(index) + 1]!;
}

/** Where the axis of the fit puts a line, nm on the recorded axis. */
export function sharedCentreNm(
  { pivotNm }: JointProblem,
  values: Float64Array,
  { nominalCentreNm, referenceNm }: JointLine,
): number {
  return nominalCentreNm + values[offsetIndex]! + values[stretchIndex]! * (referenceNm - pivotNm);
}

export function lorentzianFwhmNm(line: JointLine, values: Float64Array, index: number): number {
  return (
    line.fixedLorentzianFwhmNm + line.starkRatio * values[starkIndex]! * (1 + values[lineBase(index) + 2]!)
  );
}

/** Squared FWHM that the hydrogen of the line has before the instrument, nm^2: Doppler, and the spread of its sticks. */
function ownSquaredNm2({ sticks }: JointLine, gasKelvin: number): number {
  const fwhmPerSigmaSquared = gaussianFwhmPerSigma * gaussianFwhmPerSigma;
  let sum = 0;
  for (const stick of sticks) {
    if (stick.isDeuterium) continue;
    sum +=
      stick.weight *
      (stick.dopplerSquaredNm2PerK * gasKelvin +
        stick.fixedSquaredNm2 +
        fwhmPerSigmaSquared * stick.shiftNm * stick.shiftNm);
  }
  return sum;
}
