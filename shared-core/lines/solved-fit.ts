import type { PeakSearch } from '../axis/find-peaks.ts';
import type { AxisRegistration } from '../axis/register-axis.ts';
import type { Bench } from '../bench/bench.ts';
import type { InstrumentTerm } from '../instrument/instrument-term.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import type { HydrogenLine } from '../physics/hydrogen.ts';
import type { JointModel } from './joint-model.ts';
import type { JointProblem } from './joint-problem.ts';
import type { JointSolution } from './solve-joint.ts';

export interface FitLinesInput {
  readonly recording: CorrectedRecording;
  readonly registration: AxisRegistration;
  readonly search: PeakSearch;
  /** The lines to fit, long wavelengths first. */
  readonly lines: readonly HydrogenLine[];
  readonly bench: Bench;
  /** The instrument's measured profile; that of the bench file where absent. */
  readonly instrumentTerms?: readonly InstrumentTerm[] | null;
}

/** A solved joint fit with the problem it solved. */
export interface SolvedFit {
  readonly problem: JointProblem;
  readonly model: JointModel;
  readonly solution: JointSolution;
}
