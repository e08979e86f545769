import { fitLinearModel } from '../numeric/fit-linear-model.ts';
import { log } from '../numeric/portable-math.ts';
import type { BoltzmannInput } from './boltzmann-input.ts';
import { fitBoltzmann } from './fit-boltzmann.ts';

export interface AreaDeficit {
  /** ln(area expected from the other lines / area measured), and its standard uncertainty. */
  readonly value: number;
  readonly sigma: number;
  /** The plot of the others, about the mean upper energy of all. */
  readonly lnPopulationAtMean: number;
  readonly inverseKtPerEv: number;
}

/**
 * How far one line lies below the Boltzmann plot of the others, errors shared between lines taken into account: the
 * coefficient of an indicator of that line in a generalised least-squares fit of all.
 *
 * @param row  position of the line among those of the problem; its area > 0
 * @returns null when the plot of the others does not settle
 * @source [Draper1998] ch. 12: added-variable test
 * @check  test/unit/populations/optical-depth.test.ts
 */
export function areaDeficit(problem: BoltzmannInput, row: number): AreaDeficit | null {
  const n = problem.area.length;
  const kept = [...problem.area.keys()].filter((i) => i !== row);
  const pick = (values: Float64Array): Float64Array => Float64Array.from(kept, (i) => values[i]!);
  const pickSquare = (values: Float64Array): Float64Array =>
    Float64Array.from(kept.flatMap((i) => kept.map((j) => values[i * n + j]!)));
  const others = fitBoltzmann({
    area: pick(problem.area),
    areaCovariance: pickSquare(problem.areaCovariance),
    variancePerArea: problem.variancePerArea,
    areaPerPopulation: pick(problem.areaPerPopulation),
    upperEnergyEv: pick(problem.upperEnergyEv),
    relativeCovariance: pickSquare(problem.relativeCovariance),
  });
  if (others === null || !others.isConverged) return null;
  // All lines about the plot of the others; the freed one about its own area, which its free parameter meets exactly.
  const expected = Float64Array.from(problem.area);
  for (const [at, i] of kept.entries()) expected[i] = others.expectedArea[at]!;
  const ordinate = Float64Array.from(problem.area, (_, i) =>
    i === row
      ? log(problem.area[i]! / problem.areaPerPopulation[i]!)
      : log(expected[i]! / problem.areaPerPopulation[i]!) + (problem.area[i]! - expected[i]!) / expected[i]!,
  );
  const covariance = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      covariance[i * n + j] =
        problem.areaCovariance[i * n + j]! / (expected[i]! * expected[j]!) +
        problem.relativeCovariance[i * n + j]!;
    }
  }
  const mean = problem.upperEnergyEv.reduce((sum, energy) => sum + energy, 0) / n;
  const indicator = new Float64Array(n);
  indicator[row] = -1;
  const model = fitLinearModel(
    [new Float64Array(n).fill(1), problem.upperEnergyEv.map((energy) => mean - energy), indicator],
    ordinate,
    covariance,
  );
  if (model === null) return null;
  return {
    value: model.values[2]!,
    sigma: Math.sqrt(model.covariance[8]!),
    lnPopulationAtMean: model.values[0]!,
    inverseKtPerEv: model.values[1]!,
  };
}
