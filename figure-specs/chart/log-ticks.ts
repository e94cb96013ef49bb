import { linearTicks } from "./linear-ticks"
import { mantissaNumber, powerOfTen } from "./number-label"
import type { Ticks } from "./ticks"

const slack = 1e-9

/** Exponents of the powers of ten in a closed interval. */
function decadesIn([low, high]: readonly [number, number]): number[] {
  const first = Math.ceil(Math.log10(low) - slack)
  const last = Math.floor(Math.log10(high) + slack)
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, k) => first + k)
}

/** The values m x 10^e of an interval for the given mantissas, increasing. */
function mantissasIn([low, high]: readonly [number, number], mantissas: readonly number[]) {
  const first = Math.floor(Math.log10(low) - slack)
  const last = Math.floor(Math.log10(high) + slack)
  return Array.from({ length: last - first + 1 }, (_, k) => first + k)
    .flatMap((exponent) => mantissas.map((mantissa) => ({ mantissa, exponent })))
    .map(({ mantissa, exponent }) => ({
      value: Number(`${mantissa}e${exponent}`),
      label: mantissaNumber(mantissa, exponent),
    }))
    .filter(({ value }) => value >= low * (1 - slack) && value <= high * (1 + slack))
}

/**
 * Ticks of a logarithmic axis. Powers of ten carry the numbers, every second or third one where they would crowd; an
 * axis that holds fewer than two of them also numbers 2 and 5, or is divided evenly where it is shorter than that.
 *
 * @param domain lower and upper end, positive and increasing
 * @param room how many labels of the given text fit along the axis
 * @param lengthPt length of the axis, which decides whether minor ticks can be told apart
 */
export function logTicks(
  domain: readonly [number, number],
  room: (label: string) => number,
  lengthPt: number,
): Ticks {
  const exponents = decadesIn(domain)
  const decades = Math.log10(domain[1] / domain[0])
  const allMinor = mantissasIn(domain, [2, 3, 4, 5, 6, 7, 8, 9]).map(({ value }) => value)
  if (exponents.length >= 2) {
    const longest = powerOfTen(exponents.reduce((long, e) => (`${e}`.length > `${long}`.length ? e : long)))
    const fitting = Math.max(2, room(longest))
    const step =
      [1, 2, 3, 4, 5, 10, 20, 50, 100].find((s) => Math.ceil(decades / s) + 1 <= fitting + 1) ?? 100
    return {
      major: exponents.map((e) => ({ value: Number(`1e${e}`), label: e % step === 0 ? powerOfTen(e) : "" })),
      minor: lengthPt / decades >= 14 ? allMinor : [],
    }
  }
  for (const mantissas of [
    [1, 2, 3, 4, 5, 6, 7, 8, 9],
    [1, 2, 5],
    [1, 3],
  ]) {
    const major = mantissasIn(domain, mantissas)
    const longest = major.reduce((long, { label }) => (label.length > long.length ? label : long), "")
    if (major.length < 3 || major.length > Math.min(6, room(longest))) continue
    const taken = new Set(major.map(({ value }) => value))
    return { major, minor: allMinor.filter((value) => !taken.has(value)) }
  }
  return linearTicks(domain, room)
}
