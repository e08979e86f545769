import { lineBase, segmentBase } from './joint-problem.ts';
import { baselineTerm, createSegmentBasis, fillSegmentBasis } from './segment-basis.ts';
import type { SolvedFit } from './solved-fit.ts';

/**
 * The fitted signal drawn between the pixels of one segment: what pixels moved by 0, 1/n, 2/n ... of their width would
 * collect. Interleaved, (endPx - firstPx) * pointsPerPixel long; the first of each group is the model of the pixel itself.
 * @check test/unit/lines/joint-model.test.ts
 */
export function sampleModel(
  { problem, solution }: SolvedFit,
  segmentIndex: number,
  pointsPerPixel: number,
): Float64Array {
  const segment = problem.segments[segmentIndex]!;
  const { values } = solution;
  const pixelCount = segment.endPx - segment.firstPx;
  const out = new Float64Array(pixelCount * pointsPerPixel);
  const { edgeNm } = problem.recording;
  const base = segmentBase(problem.lines.length, segmentIndex);
  for (let k = 0; k < pointsPerPixel; k++) {
    const part = k / pointsPerPixel;
    const last = edgeNm.length - 1;
    const moved = edgeNm.map(
      (nm, i) => nm + part * (i < last ? edgeNm[i + 1]! - edgeNm[i]! : edgeNm[last]! - edgeNm[last - 1]!),
    );
    const between = { ...problem, recording: { ...problem.recording, edgeNm: moved } };
    const basis = createSegmentBasis(between, segmentIndex);
    fillSegmentBasis(between, basis, values);
    for (let i = 0; i < pixelCount; i++) {
      let sum = 0;
      for (let power = 0; power < 3; power++)
        sum += values[base + power]! * baselineTerm(segment, power, i + part);
      for (const { line, share } of basis.lineColumns)
        sum += values[lineBase(line)]! * basis.columns[share * pixelCount + i]!;
      out[i * pointsPerPixel + k] = sum;
    }
  }
  return out;
}
