import {
  instrumentIndex,
  lineBase,
  lineParameterCount,
  offsetIndex,
  segmentBase,
  starkIndex,
  stretchIndex,
  type Evaluation,
  type Segment,
} from './joint-problem.ts';

/** The part of the normal equations that one segment feeds: shared, its lines', its baseline's parameters, in that order. */
export interface Block {
  readonly segment: Segment;
  readonly index: number;
  readonly size: number;
  /** Parameter number of each row of the block. */
  readonly parameters: Int32Array;
  /** Derivatives of one pixel. */
  readonly slope: Float64Array;
  /** Lower triangle, row-major. */
  readonly normal: Float64Array;
  readonly right: Float64Array;
}

export function createBlock(segment: Segment, index: number, lineCount: number): Block {
  const parameters: number[] = [offsetIndex, stretchIndex, instrumentIndex, starkIndex];
  for (const line of segment.lines) {
    for (let k = 0; k < lineParameterCount; k++) parameters.push(lineBase(line) + k);
  }
  const base = segmentBase(lineCount, index);
  parameters.push(base, base + 1);
  const size = parameters.length;
  return {
    segment,
    index,
    size,
    parameters: Int32Array.from(parameters),
    slope: new Float64Array(size),
    normal: new Float64Array(size * size),
    right: new Float64Array(size),
  };
}

/** Adds a block to the equations of the active parameters, lower triangle. */
export function addBlock(
  { parameters, normal, right, size: own }: Block,
  position: Int32Array,
  size: number,
  out: Evaluation,
): void {
  for (let i = 0; i < own; i++) {
    const row = position[parameters[i]!]!;
    if (row < 0) continue;
    out.right[row] = out.right[row]! + right[i]!;
    for (let j = 0; j <= i; j++) {
      const column = position[parameters[j]!]!;
      if (column < 0) continue;
      const at = row >= column ? row * size + column : column * size + row;
      out.normal[at] = out.normal[at]! + normal[i * own + j]!;
    }
  }
}

/** s^T C s for the derivatives s of one pixel. */
export function quadraticForm(
  { parameters, slope, size }: Block,
  covariance: Float64Array,
  parameterCount: number,
): number {
  let sum = 0;
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++) {
      sum += slope[i]! * slope[j]! * covariance[parameters[i]! * parameterCount + parameters[j]!]!;
    }
  }
  return sum;
}
