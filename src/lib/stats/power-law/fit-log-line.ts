/** Weighting of a log–log fit; docs/methods.md says why smoothed weights are the default. */
export type LogWeights = "smoothed" | "inverse-variance" | "equal"

/** ln y = level + slope (x - centre). */
export interface LogLine {
  readonly slope: number
  /** Fitted ln y at the centre. */
  readonly level: number
  /** Weighted mean of x. */
  readonly centre: number
  /** Coefficient of the quadratic term orthogonal to the line, a test of drift; NaN with fewer than four points. */
  readonly curvature: number
}

const halfWidth = 3

/**
 * Weights of the points from..to of a row: 1/r^2 with ln r^2 averaged over up to seven neighbours inside the window,
 * because a raw error correlates with its own mean and pulls the fit towards low points. A zero error (all trajectories
 * equal there) says nothing about precision and is left out of the average; without any positive error weights are equal.
 *
 * @param lnRelativeVariance ln r^2; -Infinity where the error is zero
 */
export function logWeights(
  lnRelativeVariance: Float64Array,
  offset: number,
  from: number,
  to: number,
  mode: LogWeights,
  out: Float64Array,
): void {
  const half = mode === "smoothed" ? halfWidth : 0
  let sum = 0
  let known = 0
  for (let k = from; k < to; k += 1) {
    const value = lnRelativeVariance[offset + k]!
    if (!Number.isFinite(value)) continue
    sum += value
    known += 1
  }
  const typical = known > 0 ? sum / known : 0
  for (let k = from; k < to; k += 1) {
    let local = 0
    let n = 0
    if (mode !== "equal" && known > 0)
      for (let j = Math.max(from, k - half); j < Math.min(to, k + half + 1); j += 1) {
        const value = lnRelativeVariance[offset + j]!
        if (!Number.isFinite(value)) continue
        local += value
        n += 1
      }
    // Relative to the typical error, so that the weights are near 1 whatever the unit of precision.
    out[k - from] = n > 0 ? Math.exp(typical - local / n) : 1
  }
}

/**
 * Weighted straight line through ln y over x, two-pass with a centred abscissa.
 *
 * @param x abscissas ln t of the whole grid
 * @param lnMean ordinates; the row starts at `offset`
 * @param weights of the points from..to, length to - from
 * @see docs/methods.md, power law
 */
export function fitLogLine(
  x: Float64Array,
  lnMean: Float64Array,
  offset: number,
  from: number,
  to: number,
  weights: Float64Array,
): LogLine {
  let weight = 0
  let sumX = 0
  let sumY = 0
  for (let k = from; k < to; k += 1) {
    const w = weights[k - from]!
    weight += w
    sumX += w * x[k]!
    sumY += w * lnMean[offset + k]!
  }
  const centre = sumX / weight
  const level = sumY / weight
  let xx = 0
  let xy = 0
  let xxx = 0
  for (let k = from; k < to; k += 1) {
    const w = weights[k - from]!
    const d = x[k]! - centre
    xx += w * d * d
    xy += w * d * (lnMean[offset + k]! - level)
    xxx += w * d * d * d
  }
  const slope = xy / xx
  if (to - from < 4) return { slope, level, centre, curvature: Number.NaN }
  // The quadratic term made orthogonal to 1 and x, so that adding it leaves the line as it is.
  let qq = 0
  let qy = 0
  for (let k = from; k < to; k += 1) {
    const w = weights[k - from]!
    const d = x[k]! - centre
    const q = d * d - xx / weight - (xxx / xx) * d
    qq += w * q * q
    qy += w * q * (lnMean[offset + k]! - level - slope * d)
  }
  return { slope, level, centre, curvature: qy / qq }
}
