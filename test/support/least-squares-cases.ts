import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { projectRoot } from './source-files.ts';

interface Fitted {
  readonly values: readonly number[];
  readonly covariance: readonly (readonly number[])[];
  readonly chiSquare: number;
}

/** Answers of SciPy, mpmath and exact fractions; test/tools/least-squares.py makes them. */
export interface LeastSquaresCases {
  readonly boundedLinear: readonly {
    readonly matrix: readonly (readonly number[])[];
    readonly right: readonly number[];
    readonly lowest: readonly number[];
    readonly highest: readonly number[];
    readonly values: readonly number[];
    readonly held: readonly boolean[];
    readonly objective: number;
  }[];
  readonly decay: {
    readonly x: readonly number[];
    readonly counts: readonly number[];
    readonly readVariance: number;
    readonly followed: Fitted;
    readonly weightedData: readonly number[];
    readonly sigma: readonly number[];
    readonly weighted: Fitted;
    readonly lowest: readonly number[];
    readonly highest: readonly number[];
    /** Covariance of the two parameters that the bound of the third leaves. */
    readonly bounded: Fitted;
  };
  readonly dots: readonly {
    readonly start: number;
    readonly a: readonly number[];
    readonly b: readonly number[];
    readonly exact: number;
    readonly size: number;
  }[];
  readonly weightedLinear: Fitted & {
    readonly x: readonly number[];
    readonly y: readonly number[];
    readonly weights: readonly number[];
    readonly rSquared: number;
  };
  readonly inverseOfNormal: {
    readonly matrix: readonly (readonly number[])[];
    readonly inverse: readonly (readonly number[])[];
  };
}

export const leastSquaresCases = JSON.parse(
  readFileSync(join(projectRoot, 'test/data/least-squares.json'), 'utf8'),
) as LeastSquaresCases;

/** The order in which qr.ts wants a matrix. */
export const columnByColumn = (rows: readonly (readonly number[])[]): Float64Array =>
  Float64Array.from((rows[0] ?? []).flatMap((_, j) => rows.map((row) => row[j]!)));
