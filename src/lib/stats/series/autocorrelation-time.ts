/** Integrated autocorrelation time of a stationary series, in steps of the series. */
export interface AutocorrelationTime {
  /** 1/2 for independent values. */
  readonly tau: number
  readonly standardError: number
  /** Lags summed. */
  readonly window: number
}

/** Ratio of the window to the autocorrelation time that balances truncation against noise. */
const windowFactor = 1.5

/**
 * Integrated autocorrelation time with automatic window: correlations are summed up to the lag at which truncation error
 * and statistical noise balance.
 *
 * @param values of one stationary stretch, equally spaced
 * @returns tau 0.5 for a constant series
 * @see Wolff, Comput. Phys. Commun. 156, 143 (2004), equations 41 to 52
 */
export function autocorrelationTime(values: Float64Array): AutocorrelationTime {
  const n = values.length
  const mean = values.reduce((sum, value) => sum + value, 0) / n
  const centred = values.map((value) => value - mean)
  const correlation = (lag: number) => {
    let sum = 0
    for (let k = 0; k + lag < n; k += 1) sum += centred[k]! * centred[k + lag]!
    return sum / (n - lag)
  }
  const variance = correlation(0)
  if (variance === 0) return { tau: 0.5, standardError: 0, window: 0 }
  let tau = 0.5
  let window = 0
  for (let lag = 1; lag < n / 2; lag += 1) {
    tau += correlation(lag) / variance
    window = lag
    const scale = tau > 0.5 ? windowFactor / Math.log((2 * tau + 1) / (2 * tau - 1)) : 1e-10
    if (Math.exp(-lag / scale) < scale / Math.sqrt(lag * n)) break
  }
  // The mean is that of the same series: its error lowers every correlation.
  const corrected = tau * (1 + (2 * window + 1) / n)
  return {
    tau: corrected,
    standardError: corrected * Math.sqrt((4 * (window + 0.5 - corrected)) / n),
    window,
  }
}
