import { quantile } from '../numeric/robust.ts';
import { instrumentIndex, lineBase, segmentBase, starkIndex, type JointProblem } from './joint-problem.ts';

/** Baselines from the quieter half of each segment, areas from what stands above within a width of each line. */
export function startLinearParameters(problem: JointProblem, values: Float64Array): void {
  const { recording, segments, lines, masked } = problem;
  const { netSignal, wavelengthNm } = recording;
  for (const [s, { firstPx, endPx, lines: members }] of segments.entries()) {
    const floor = lowerQuartile(netSignal, masked, firstPx, endPx);
    values[segmentBase(lines.length, s)] = floor;
    for (const index of members) {
      const line = lines[index]!;
      const reachNm = 1.2 * (values[instrumentIndex]! + line.starkRatio * Math.max(0, values[starkIndex]!));
      let area = 0;
      for (let px = firstPx; px < endPx; px++) {
        if (masked[px] === 1 || Math.abs(wavelengthNm[px]! - line.nominalCentreNm) > reachNm) continue;
        const widthNm =
          recording.signalKind === 'per-nm' ? recording.edgeNm[px + 1]! - recording.edgeNm[px]! : 1;
        area += (netSignal[px]! - floor) * widthNm;
      }
      // Never zero: a line without area has no shape, and the first step could not tell its width.
      values[lineBase(index)] = Math.max(area, Math.abs(area) * 0.1 + Number.EPSILON);
    }
  }
}

function lowerQuartile(signal: Float64Array, masked: Uint8Array, firstPx: number, endPx: number): number {
  const kept = new Float64Array(endPx - firstPx);
  let count = 0;
  for (let px = firstPx; px < endPx; px++) if (masked[px] === 0) kept[count++] = signal[px]!;
  return count === 0 ? 0 : quantile(kept.subarray(0, count), 0.25);
}

/** Before any fit: the signal itself, over the baselines the fit starts from, which are written to `baseline`. */
export function roughExpectation(problem: JointProblem, values: Float64Array, baseline: Float64Array) {
  const { netSignal } = problem.recording;
  for (const [s, { firstPx, endPx }] of problem.segments.entries()) {
    baseline.fill(values[segmentBase(problem.lines.length, s)]!, firstPx, endPx);
  }
  return { modelled: netSignal, baseline };
}
