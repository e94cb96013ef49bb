import { powerOfTen } from "./number-label"
import type { Ticks } from "./ticks"

/** Minus a power of ten, set as a number. */
const signed = (sign: number, exponent: number): string =>
  sign < 0 ? `\u2212${powerOfTen(exponent)}` : powerOfTen(exponent)

/**
 * Ticks of a scale that is logarithmic on both sides of a linear middle: zero and the powers of ten outside the middle,
 * at most four a side.
 *
 * @param constant half-width of the middle
 */
export function symlogTicks(domain: readonly [number, number], constant: number): Ticks {
  const side = (sign: number, reach: number) => {
    const first = Math.ceil(Math.log10(constant) - 1e-9)
    const last = Math.floor(Math.log10(Math.max(reach, constant)) + 1e-9)
    const step = Math.max(1, Math.ceil((last - first + 1) / 4))
    return Array.from({ length: Math.max(0, last - first + 1) }, (_, k) => first + k)
      .filter((exponent) => (last - exponent) % step === 0)
      .map((exponent) => ({ value: sign * 10 ** exponent, label: signed(sign, exponent) }))
      .filter(({ value }) => Math.abs(value) <= reach * (1 + 1e-9))
  }
  const below = side(-1, -domain[0]).reverse()
  const above = side(1, domain[1])
  const zero = domain[0] <= 0 && domain[1] >= 0 ? [{ value: 0, label: "0" }] : []
  return { major: [...below, ...zero, ...above], minor: [] }
}
