/** Times from `first` to `last`, `perDecade` to a decade, rounded to four digits as a simulation would print them. */
export function logTimes(first: number, last: number, perDecade: number): number[] {
  const steps = Math.round(Math.log10(last / first) * perDecade)
  const times = Array.from({ length: steps + 1 }, (_, k) =>
    Number((first * 10 ** (k / perDecade)).toPrecision(4)),
  )
  return times.filter((t, k) => k === 0 || t > times[k - 1]!)
}
