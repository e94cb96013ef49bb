import type { Ensemble } from "./ensemble"

/**
 * Averages each trajectory inside logarithmic bins, so that the ensemble statistics are taken over trajectories and never
 * over pooled (correlated) points. Bins are half-open, [lo, hi), with edges t0 10^(j/b) from the first t > 0; a bin with
 * fewer than two times is kept as the single point that it is. The abscissa of a bin is the geometric mean of its times.
 * t <= 0 is left out.
 *
 * @param perDecade bins per decade b, 3 to 30
 * @returns an ensemble with as many times as there are occupied bins; missing values make the trajectory's bin missing
 * @see docs/methods.md, logarithmic bins: for y ~ t^-a the bin mean exceeds the law at the bin's abscissa by the constant
 *   factor sinh(a h)/(a h), h = ln(10)/(2 b), so exponents are untouched and amplitudes are off by (a h)^2/6
 */
export function logBinEnsemble(ensemble: Ensemble, perDecade: number): Ensemble {
  const { abscissa, values, ids, weights } = ensemble
  const times = abscissa.length
  const start = abscissa.findIndex((t) => t > 0)
  if (start < 0) return { ...ensemble, abscissa: new Float64Array(0), values: new Float64Array(0) }
  const origin = abscissa[start]!
  const bins: [number, number][] = []
  let binOfLast = -1
  for (let k = start; k < times; k += 1) {
    // The tiny shift keeps a time that is an edge up to rounding in the bin that it opens.
    const bin = Math.floor(perDecade * Math.log10(abscissa[k]! / origin) + 1e-9)
    if (bin === binOfLast) bins[bins.length - 1]![1] = k + 1
    else bins.push([k, k + 1])
    binOfLast = bin
  }
  const centres = Float64Array.from(bins, ([from, to]) => {
    let sum = 0
    for (let k = from; k < to; k += 1) sum += Math.log(abscissa[k]!)
    return to - from === 1 ? abscissa[from]! : Math.exp(sum / (to - from))
  })
  const binned = new Float64Array(ids.length * bins.length)
  for (let i = 0; i < ids.length; i += 1)
    bins.forEach(([from, to], b) => {
      let sum = 0
      for (let k = from; k < to; k += 1) sum += values[i * times + k]!
      binned[i * bins.length + b] = sum / (to - from)
    })
  return weights
    ? { abscissa: centres, values: binned, ids, weights }
    : { abscissa: centres, values: binned, ids }
}
