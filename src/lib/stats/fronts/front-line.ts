import { factorQr, applyQTranspose, solveTriangle } from "../nonlinear/householder-qr"
import { fitLogLine } from "../power-law/fit-log-line"

export interface FrontLine {
  readonly velocity: number
  /** d of x = v t + d t^(1/3) + x0; NaN for a ballistic front. */
  readonly widening: number
  /** Quadratic term of the arrival time over position, orthogonal to the line. */
  readonly curvature: number
}

/**
 * Velocity from positions and arrival times. Ballistic: the arrival time, which carries the error, is regressed on the
 * position, and v is one over the slope. Airy: positions on t, t^(1/3) and 1, because a free lattice front advances as
 * v t + const t^(1/3) and a straight line misses v by O(t^(-2/3)).
 *
 * @param x positions; @param t arrival times; both of length n >= 2
 * @see Hunyadi, Racz & Sasvari, Phys. Rev. E 69, 066103 (2004)
 */
export function frontLine(x: Float64Array, t: Float64Array, model: "ballistic" | "airy"): FrontLine {
  const n = x.length
  const { slope, curvature } = fitLogLine(x, t, 0, 0, n, new Float64Array(n).fill(1))
  if (model === "ballistic") return { velocity: 1 / slope, widening: Number.NaN, curvature }
  const scale = Math.max(...t)
  const matrix = new Float64Array(n * 3)
  t.forEach((time, k) => matrix.set([time / scale, Math.cbrt(time / scale), 1], k * 3))
  const qr = factorQr(matrix, n, 3)
  const right = Float64Array.from(x)
  applyQTranspose(qr, right)
  const [v, d] = solveTriangle(qr, right)
  return { velocity: v! / scale, widening: d! / Math.cbrt(scale), curvature }
}
