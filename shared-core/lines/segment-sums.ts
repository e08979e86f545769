import type { Evaluation } from './joint-problem.ts';
import type { SegmentBasis } from './segment-basis.ts';

/** Weighted sums of one segment over its pixels, in columns: lower triangle of B^T W B, and B^T W r. */
export interface SegmentSums {
  readonly normal: Float64Array;
  readonly right: Float64Array;
}

export const createSegmentSums = (columnCount: number): SegmentSums => ({
  normal: new Float64Array(columnCount * columnCount),
  right: new Float64Array(columnCount),
});

/** Adds one pixel. */
export function addPixel(
  { normal, right }: SegmentSums,
  columns: Float64Array,
  row: number,
  columnCount: number,
  weight: number,
  residual: number,
): void {
  for (let i = 0; i < columnCount; i++) {
    const scaled = weight * columns[row + i]!;
    right[i] = right[i]! + scaled * residual;
    const at = i * columnCount;
    for (let j = 0; j <= i; j++) normal[at + j] = normal[at + j]! + scaled * columns[row + j]!;
  }
}

/**
 * Adds the sums of a segment to the equations of the active parameters, lower triangle, by the chain rule.
 * @param position  of each parameter among the active ones, -1 for those held fixed
 */
export function addToEquations(
  { links, columnCount }: SegmentBasis,
  { normal, right }: SegmentSums,
  position: Int32Array,
  size: number,
  out: Evaluation,
): void {
  for (const a of links) {
    const row = position[a.parameter]!;
    if (row < 0) continue;
    out.right[row] = out.right[row]! + a.weight * right[a.column]!;
    for (const b of links) {
      const column = position[b.parameter]!;
      if (column < 0 || column > row) continue;
      const sum =
        a.column >= b.column
          ? normal[a.column * columnCount + b.column]!
          : normal[b.column * columnCount + a.column]!;
      out.normal[row * size + column] = out.normal[row * size + column]! + a.weight * b.weight * sum;
    }
  }
}

/** The part of a parameter covariance that a segment's columns see: chain^T C chain, full square matrix. */
export function columnCovariance(
  { links, columnCount }: SegmentBasis,
  covariance: Float64Array,
  parameterCount: number,
): Float64Array {
  const out = new Float64Array(columnCount * columnCount);
  for (const a of links) {
    for (const b of links) {
      const at = a.column * columnCount + b.column;
      out[at] = out[at]! + a.weight * b.weight * covariance[a.parameter * parameterCount + b.parameter]!;
    }
  }
  return out;
}
