import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import {
  fitNonlinear,
  type LeastSquaresSolution,
} from '../../../shared-core/numeric/damped-least-squares.ts';
import { fitLinear, type LinearFit } from '../../../shared-core/numeric/linear-least-squares.ts';
import { log, log10 } from '../../../shared-core/numeric/portable-math.ts';
import { nonlinearModels } from './nonlinear-models.ts';

interface DataSet {
  readonly name: string;
  readonly source: string;
  readonly level: 'lower' | 'average' | 'higher';
  /** Certified parameters and standard deviations. */
  readonly values: readonly number[];
  readonly deviations: readonly number[];
  readonly residualDeviation: number;
  /** One list of all observations for each predictor. */
  readonly predictors: readonly (readonly number[])[];
  readonly observed: readonly number[];
}

export interface NonlinearSet extends DataSet {
  readonly starts: readonly (readonly number[])[];
  readonly residualSumOfSquares: number;
}

export interface LinearSet extends DataSet {
  readonly model: 'polynomial' | 'multilinear';
  readonly lowestPower: number;
  readonly rSquared: number;
}

function readSets<T>(kind: string, root: string): readonly T[] {
  const folder = join(root, 'test', 'data', 'strd', kind);
  return readdirSync(folder).map((file) => JSON.parse(readFileSync(join(folder, file), 'utf8')) as T);
}

export const nonlinearSets = (root: string): readonly NonlinearSet[] => readSets('nonlinear', root);
export const linearSets = (root: string): readonly LinearSet[] => readSets('linear', root);

export function fitNonlinearSet(
  set: NonlinearSet,
  starts: readonly (readonly number[])[],
): LeastSquaresSolution {
  const pointModel = nonlinearModels[set.name];
  if (pointModel === undefined) throw new Error(`no model for ${set.name}`);
  const rows = set.observed.length;
  const points = set.observed.map((_, i) => set.predictors.map((column) => column[i]!));
  const slope = new Float64Array(set.values.length);
  return fitNonlinear({
    observed: Float64Array.from(set.observed, (y) => (set.name === 'Nelson' ? log(y) : y)),
    starts: starts.map((start) => Float64Array.from(start)),
    model: {
      evaluate: (b, modelled) => {
        for (let i = 0; i < rows; i++) modelled[i] = pointModel(b, points[i]!, slope);
      },
      differentiate: (b, jacobian) => {
        for (let i = 0; i < rows; i++) {
          pointModel(b, points[i]!, slope);
          for (let j = 0; j < slope.length; j++) jacobian[j * rows + i] = slope[j]!;
        }
      },
    },
  });
}

/** Standard deviations where the scatter of the residuals is the only measure of the noise. */
export function deviationsFromScatter({
  covariance,
  chiSquare,
  degreesOfFreedom,
  values,
}: LeastSquaresSolution): number[] {
  const n = values.length;
  return Array.from(values, (_, j) => Math.sqrt((covariance[j * n + j]! * chiSquare) / degreesOfFreedom));
}

export function fitLinearSet(set: LinearSet): LinearFit | null {
  const rows = set.observed.length;
  const columns: (readonly number[])[] = [];
  const [x = []] = set.predictors;
  if (set.model === 'multilinear')
    columns.push(
      set.observed.map(() => 1),
      ...set.predictors,
    );
  else {
    let power = x.map((value) => (set.lowestPower === 0 ? 1 : value));
    for (let k = 0; k < set.values.length; k++) {
      columns.push(power);
      power = power.map((value, i) => value * x[i]!);
    }
  }
  return fitLinear({
    design: Float64Array.from(
      { length: rows * columns.length },
      (_, at) => columns[Math.floor(at / rows)]![at % rows]!,
    ),
    observed: Float64Array.from(set.observed),
    hasIntercept: set.lowestPower === 0,
  });
}

/** Digits that a certified value of this precision can confirm at most. */
export const certifiedDigits = { nonlinear: 11, linear: 15 } as const;

/**
 * Log relative error: -log10(|x - c| / |c|), -log10(|x|) for a certified zero; at most the certified digits. This is the
 * measure in which results on these data sets are commonly given (common practice).
 */
export function digitsAgreed(actual: number, certified: number, most: number): number {
  const error = Math.abs(actual - certified) / (certified === 0 ? 1 : Math.abs(certified));
  if (Number.isNaN(error)) return 0;
  return error === 0 ? most : Math.max(0, Math.min(most, -log10(error)));
}

export const fewestDigits = (actual: ArrayLike<number>, certified: readonly number[], most: number): number =>
  certified.reduce((least, value, j) => Math.min(least, digitsAgreed(actual[j]!, value, most)), most);
