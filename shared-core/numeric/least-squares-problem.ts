import type { FitStatus } from './damped-iteration.ts';

export interface ModelFunction {
  /** Writes the model's value of every observation. */
  readonly evaluate: (values: Float64Array, modelled: Float64Array) => void;
  /** Writes d modelled / d parameter, column by column: all observations of the first parameter, of the second, ... */
  readonly differentiate: (values: Float64Array, jacobian: Float64Array) => void;
}

export interface LeastSquaresProblem {
  readonly model: ModelFunction;
  readonly observed: Float64Array;
  /** One or more places to start from: the fit is made from each, and the best answer counts. */
  readonly starts: readonly Float64Array[];
  /** Variance of each observation; 1 where absent. A function writes it from the modelled values, and is followed. */
  readonly variance?: Float64Array | ((modelled: Float64Array, variance: Float64Array) => void);
  /** Bounds of the parameters; -Infinity and Infinity, or absence, where there are none. */
  readonly lowest?: Float64Array;
  readonly highest?: Float64Array;
  /** Relative error of the model's own arithmetic: what it cannot tell apart ends the fit. Machine precision where absent. */
  readonly precision?: number;
  /** From one start, in one attempt. */
  readonly maxEvaluations?: number;
}

export interface LeastSquaresFit {
  readonly status: FitStatus;
  readonly values: Float64Array;
  /** (J^T W J)^-1, row-major, for data of the stated variance; rows of parameters held by a bound are zero. */
  readonly covariance: Float64Array;
  /** Whether the parameter is on a bound and the data pull it further. */
  readonly isHeld: readonly boolean[];
  readonly chiSquare: number;
  /** Observations less parameters that no bound holds. */
  readonly degreesOfFreedom: number;
  /** Of the model; derivatives, one for each point accepted, are not counted. */
  readonly evaluationCount: number;
}
