/**
 * M trajectories of one observable on one common abscissa grid of T points.
 *
 * The trajectory is the unit of evidence: every uncertainty in this code comes from leaving out or resampling whole
 * rows of `values`, never single points.
 */
export interface Ensemble {
  /** Abscissa (usually time), length T, strictly increasing, in the unit of its column. */
  readonly abscissa: Float64Array
  /** y_ik at index `i * T + k`, in the unit of the observable; NaN where trajectory i has no value. */
  readonly values: Float64Array
  /** Identifier of each trajectory as it stands in the table, length M. */
  readonly ids: readonly string[]
  /** Importance weight of each trajectory, constant in time, length M; absent when all count the same. */
  readonly weights?: Float64Array
}
