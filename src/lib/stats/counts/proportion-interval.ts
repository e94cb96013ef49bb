import { fQuantile } from "../distributions/f-quantile"
import { normalQuantile } from "../distributions/normal-quantile"

/**
 * Exact central interval of a proportion from k successes in n trials, which covers at least its level.
 *
 * @see Clopper & Pearson, Biometrika 26, 404 (1934); the beta quantiles are written through those of F
 */
export function clopperPearsonInterval(k: number, n: number, level: number): readonly [number, number] {
  const tail = (1 - level) / 2
  /** Quantile p of the beta distribution with parameters a and b. */
  const betaQuantile = (p: number, a: number, b: number) => {
    const f = (a / b) * fQuantile(p, 2 * a, 2 * b)
    return f / (1 + f)
  }
  return [k === 0 ? 0 : betaQuantile(tail, k, n - k + 1), k === n ? 1 : betaQuantile(1 - tail, k + 1, n - k)]
}

/**
 * Score interval of a proportion: shorter than the exact one, covering its level on average.
 *
 * @see Wilson, J. Am. Stat. Assoc. 22, 209 (1927)
 */
export function wilsonInterval(k: number, n: number, level: number): readonly [number, number] {
  const z = normalQuantile((1 + level) / 2)
  const p = k / n
  const centre = (p + (z * z) / (2 * n)) / (1 + (z * z) / n)
  const half = (z / (1 + (z * z) / n)) * Math.sqrt((p * (1 - p)) / n + (z * z) / (4 * n * n))
  return [k === 0 ? 0 : centre - half, k === n ? 1 : centre + half]
}
