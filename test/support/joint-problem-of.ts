import { findPeaks } from '../../shared-core/axis/find-peaks.ts';
import { noAdditions } from '../../shared-core/lines/additions.ts';
import { chooseWindows } from '../../shared-core/lines/choose-windows.ts';
import type { JointProblem } from '../../shared-core/lines/joint-problem.ts';
import { poseProblem, toJointLine } from '../../shared-core/lines/pose-problem.ts';
import type { FitLinesInput } from '../../shared-core/lines/solved-fit.ts';
import { correctRecording } from '../../shared-core/noise/correct-recording.ts';
import { hydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import { simulateRecording, type SimulationInput } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from './diagnose-simulated.ts';

/** The joint problem of a simulated recording with a right axis, as the chain poses it first. */
export function jointProblemOf(
  simulated: Partial<SimulationInput> & { readonly seed: number },
  change: Partial<JointProblem> = {},
): JointProblem {
  const { wavelengthNm, signal } = simulateRecording({
    bench: knownBench,
    kelvin: 7000,
    electronsPerCubicMetre: 1e19,
    continuumElectrons: 40,
    ...simulated,
  });
  const corrected = correctRecording(asRecording(wavelengthNm, signal), null, knownBench);
  if (!corrected.ok) throw new Error(corrected.problem.code);
  const recording = corrected.value;
  const input: FitLinesInput = {
    recording,
    registration: {
      status: 'registered',
      map: { pivotNm: 500, offsetNm: 0, stretch: 0, bowPerNm: 0 },
      matched: [],
      evidence: 0,
      rivalEvidence: null,
      rivalOffsetNm: null,
    },
    search: findPeaks(recording, 0.18),
    lines: [3, 4, 5, 6, 7].map((level) => hydrogenLine(level)),
    bench: knownBench,
  };
  const candidates = input.lines.map((line) => toJointLine(input, line));
  const foreign = input.search.peaks.filter(({ recordedNm }) =>
    candidates.every(({ referenceNm }) => Math.abs(referenceNm - recordedNm) > 0.2),
  );
  const widths = { instrumentNm: 0.18, starkNm: 0.02 };
  const plan = chooseWindows(recording, candidates, foreign, { ...widths, starkNm: 0 });
  return { ...poseProblem(input, plan, widths, 'shared', noAdditions), ...change };
}
