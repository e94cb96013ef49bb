import { chiSquareQuantile } from "../distributions/chi-square-quantile"

/**
 * Exact central interval of a Poisson mean from one count.
 *
 * @param count k, a non-negative integer
 * @param level such as 0.95
 * @see Garwood, Biometrika 28, 437 (1936): chi2(a/2; 2k)/2 and chi2(1 - a/2; 2k + 2)/2
 * @example garwoodInterval(0, 0.95)[0] // 0
 */
export function garwoodInterval(count: number, level: number): readonly [number, number] {
  const tail = (1 - level) / 2
  return [
    count === 0 ? 0 : chiSquareQuantile(tail, 2 * count) / 2,
    chiSquareQuantile(1 - tail, 2 * count + 2) / 2,
  ]
}
