import { instrumentIndex, lineBase, segmentBase, starkIndex, type JointProblem } from './joint-problem.ts';

/** Baselines from the quieter half of each segment, areas from what stands above within a width of each line. */
export function startLinearParameters(problem: JointProblem, values: Float64Array): void {
  const { recording, segments, lines, masked } = problem;
  const { netSignal, wavelengthNm } = recording;
  for (const [s, { firstPx, endPx, lines: members }] of segments.entries()) {
    const kept = netSignal.slice(firstPx, endPx).filter((_, i) => masked[firstPx + i] === 0);
    const floor = quantile25(kept);
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

function quantile25(values: Float64Array): number {
  const sorted = values.sort();
  return sorted[Math.floor(0.25 * Math.max(0, sorted.length - 1))] ?? 0;
}

/** Before any fit: the signal itself, over the baselines the fit starts from, which are written to `baseline`. */
export function roughExpectation(problem: JointProblem, values: Float64Array, baseline: Float64Array) {
  const { netSignal } = problem.recording;
  for (const [s, { firstPx, endPx }] of problem.segments.entries()) {
    baseline.fill(values[segmentBase(problem.lines.length, s)]!, firstPx, endPx);
  }
  return { modelled: netSignal, baseline };
}
