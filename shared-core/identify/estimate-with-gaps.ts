import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { choleskyFactor, choleskySolve } from '../numeric/cholesky.ts';
import type { KernelFamily } from './place-kernels.ts';
import type { Reading } from './reading.ts';

/** Share of the shape's light that must lie on pixels that count. */
const leastShare = 0.6;
const leastPixels = 6;

/**
 * Area of a shape at a place by least squares on a straight baseline over the pixels that are not excluded.
 * @param at  pixel nearest to the place
 * @returns false when too little is left to tell shape from baseline
 * @source  normal equations in equal noise: [Draper1998] ch. 5
 * @check   test/unit/identify/place-meter.test.ts
 */
export function estimateWithGaps(
  { netSignal, noise }: CorrectedRecording,
  excluded: Uint8Array,
  variancePerSignal: number,
  family: KernelFamily,
  phase: number,
  at: number,
  out: Reading,
): boolean {
  const shape = family.shapes[phase]!;
  const first = Math.max(0, at - family.before);
  const last = Math.min(netSignal.length - 1, at + family.after);
  const normal = new Float64Array(9);
  let count = 0;
  let share = 0;
  let whole = 0;
  let lowest = Infinity;
  for (let k = 0; k < shape.length; k++) whole += shape[k]!;
  for (let px = first; px <= last; px++) {
    if (excluded[px] === 1) continue;
    const value = shape[px - at + family.before]!;
    const x = (px - at) / family.before;
    count++;
    share += value / whole;
    lowest = Math.min(lowest, netSignal[px]!);
    normal[0] = normal[0]! + value * value;
    normal[3] = normal[3]! + value;
    normal[4] = normal[4]! + 1;
    normal[6] = normal[6]! + value * x;
    normal[7] = normal[7]! + x;
    normal[8] = normal[8]! + x * x;
  }
  if (count < leastPixels || share < leastShare || !choleskyFactor(normal, 3)) return false;
  // The row of the inverse that belongs to the area.
  const row = Float64Array.from([1, 0, 0]);
  choleskySolve(normal, 3, row);
  const floor = noise.signalReference === 'baseline' ? Math.max(0, lowest) : 0;
  let area = 0;
  let variance = 0;
  for (let px = first; px <= last; px++) {
    if (excluded[px] === 1) continue;
    const w = row[0]! * shape[px - at + family.before]! + row[1]! + (row[2]! * (px - at)) / family.before;
    const light = Math.max(0, netSignal[px]! - floor);
    area += w * netSignal[px]!;
    variance += w * w * (noise.fixedVariance[px]! + variancePerSignal * light);
  }
  out.area = area;
  out.sigma = Math.sqrt(variance);
  return variance > 0;
}
