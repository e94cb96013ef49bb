import { normalQuantile } from "../distributions/normal-quantile"
import { randomStream } from "../random/random-stream"
import type { ReplicatedMeans } from "./replicated-means"

/** Above this relative error a positive value is drawn from a lognormal, which cannot change its sign. */
const lognormalAbove = 0.2

/**
 * Points with given standard errors in place of an ensemble: resample b is y + sigma z, points independent; a positive y
 * with sigma/y > 0.2 is drawn from the lognormal of the same mean and standard deviation.
 *
 * @param t abscissas, increasing; @param y values; @param sigma standard errors, positive; all of length K
 * @see docs/methods.md, values with errors
 */
export function parametricMeans(
  t: Float64Array,
  y: Float64Array,
  sigma: Float64Array,
  { resamples, seed }: { readonly resamples: number; readonly seed: number },
): ReplicatedMeans {
  const points = t.length
  const mean = new Float64Array((resamples + 1) * points)
  const variance = new Float64Array((resamples + 1) * points)
  mean.set(y)
  for (let b = 0; b < resamples; b += 1) {
    const stream = randomStream(seed, b)
    for (let k = 0; k < points; k += 1) {
      const z = normalQuantile((stream.uint32() + 0.5) / 4294967296)
      const relative = sigma[k]! / y[k]!
      const logVariance = Math.log1p(relative * relative)
      mean[(b + 1) * points + k] =
        relative > lognormalAbove
          ? y[k]! * Math.exp(Math.sqrt(logVariance) * z - logVariance / 2)
          : y[k]! + sigma[k]! * z
    }
  }
  for (let row = 0; row <= resamples; row += 1)
    for (let k = 0; k < points; k += 1) variance[row * points + k] = sigma[k]! ** 2
  return { abscissa: t, replicates: resamples, mean, variance }
}
