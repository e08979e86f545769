import { findPeaks } from '../../shared-core/axis/find-peaks.ts';
import { chooseWindows } from '../../shared-core/lines/choose-windows.ts';
import { fixedAt, free, type JointLine, type JointProblem } from '../../shared-core/lines/joint-problem.ts';
import { correctRecording } from '../../shared-core/noise/correct-recording.ts';
import { hydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import { lorentzianBeforehandNm, thermalFwhmSquaredNm2 } from '../../shared-core/physics/line-widths.ts';
import { starkWidthRelativeToHBeta } from '../../shared-core/physics/stark.ts';
import { simulateRecording, type SimulationInput } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from './diagnose-simulated.ts';

/** The joint problem of a simulated recording with a right axis, as the chain poses it first. */
export function jointProblemOf(
  input: Partial<SimulationInput> & { readonly seed: number },
  change: Partial<JointProblem> = {},
): JointProblem {
  const { wavelengthNm, signal } = simulateRecording({
    bench: knownBench,
    kelvin: 7000,
    electronsPerCubicMetre: 1e19,
    continuumElectrons: 40,
    ...input,
  });
  const corrected = correctRecording(asRecording(wavelengthNm, signal), null, knownBench);
  if (!corrected.ok) throw new Error(corrected.problem.code);
  const recording = corrected.value;
  const candidates = [3, 4, 5, 6, 7].map((level): JointLine => {
    const line = hydrogenLine(level);
    return {
      id: line.id,
      upperLevel: level,
      referenceNm: line.wavelengthAirNm,
      nominalCentreNm: line.wavelengthAirNm,
      extraFwhmSquaredNm2: thermalFwhmSquaredNm2(line, {}),
      starkRatio: starkWidthRelativeToHBeta(level).ratio,
      fixedLorentzianFwhmNm: lorentzianBeforehandNm(line, {}),
    };
  });
  const foreign = findPeaks(recording, 0.18).peaks.filter(({ recordedNm }) =>
    candidates.every(({ referenceNm }) => Math.abs(referenceNm - recordedNm) > 0.2),
  );
  const plan = chooseWindows(recording, candidates, foreign, { instrumentNm: 0.18, starkNm: 0 });
  return {
    recording,
    masked: plan.masked,
    lines: plan.lines,
    segments: plan.segments,
    pivotNm: 500,
    variancePerSignal: recording.noise.variancePerSignal,
    relativeMisfit: 0,
    beliefs: {
      offsetNm: { mean: 0, sigma: 0.18 },
      stretch: { mean: 0, sigma: 0.002 },
      instrumentFwhmNm: { mean: 0.18, sigma: 0.004 },
      starkFwhmNm: free,
      centreDepartureNm: { mean: 0, sigma: 0.027 },
      starkDeparture: plan.lines.map(({ upperLevel }) => ({
        mean: 0,
        sigma: starkWidthRelativeToHBeta(upperLevel).relativeSigma,
      })),
      widthDeparture: fixedAt(0),
    },
    expected: null,
    start: { instrumentFwhmNm: 0.18, starkFwhmNm: 0.02 },
    ...change,
  };
}
