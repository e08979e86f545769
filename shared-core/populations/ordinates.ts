/** The points of a Boltzmann plot with their covariance; n of each, covariance row-major n x n. */
export interface Ordinates {
  readonly upperEnergyEv: Float64Array;
  readonly ordinate: Float64Array;
  readonly ordinateCovariance: Float64Array;
}
