import type { SimulationInput } from './simulation-input.ts';

/** What recording programs do to counts before they write them: a running mean, then coarse steps of the full scale. */
export function exportCounts(
  counts: Float64Array,
  saturationCounts: number,
  { smoothingPoints = 1, levels }: Pick<SimulationInput, 'smoothingPoints' | 'levels'>,
): Float64Array {
  const smooth = smoothingPoints > 1 ? runningMean(counts, smoothingPoints) : counts;
  return levels === undefined
    ? smooth
    : smooth.map((value) => Math.round((value / saturationCounts) * levels));
}

function runningMean(counts: Float64Array, points: number): Float64Array {
  const half = Math.floor(points / 2);
  const last = counts.length - 1;
  return counts.map((_, px) => {
    let sum = 0;
    for (let k = px - half; k <= px + half; k++) sum += counts[Math.max(0, Math.min(last, k))]!;
    return sum / (2 * half + 1);
  });
}
