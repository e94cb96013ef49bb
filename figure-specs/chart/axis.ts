import type { AxisDrawing, Look, ScaleType } from "./drawing"
import { linearTicks } from "./linear-ticks"
import { logTicks } from "./log-ticks"
import { estimateWidthEm, powerOfTen } from "./number-label"

interface AxisWish {
  readonly title: string
  readonly scale: Exclude<ScaleType, "symlog">
  readonly domain: readonly [number, number]
  readonly direction: "horizontal" | "vertical"
  readonly lengthPt: number
  readonly look: Look
}

/** An axis with the ticks that fit its length at the size of type of the look. */
export function axisOf({ title, scale, domain, direction, lengthPt, look }: AxisWish): AxisDrawing {
  const room = (label: string) => {
    const size = direction === "horizontal" ? estimateWidthEm(label) * look.smallPt : look.smallPt
    return Math.floor(lengthPt / (size + look.labelGapPt)) + 1
  }
  const {
    major,
    minor,
    power = 0,
  } = scale === "log" ? logTicks(domain, room, lengthPt) : linearTicks(domain, room)
  const factor = power === 0 ? {} : { factor: `×\u2009${powerOfTen(power)}` }
  return { title, scale, domain, major, minor, ...factor }
}

/** Moves an end to the power of ten beside it, if that is close and still leaves the outermost value some air. */
function snapToDecade(end: number, outermost: number, reach: number, air: number): number {
  const decade = Math.round(end / Math.LN10) * Math.LN10
  const outwards = Math.sign(end - outermost)
  return Math.abs(decade - end) <= reach && outwards * (decade - outermost) >= air ? decade : end
}

/**
 * A domain around values with a margin on both sides, in the measure of the axis: a share of the logarithm on a log
 * axis, of the span on a linear one. Ends of a log axis that come close to a power of ten are put there. A single value
 * gets room around it.
 *
 * @param margin share of the span added at each end
 */
export function paddedDomain(
  values: readonly number[],
  scale: "log" | "linear",
  margin: number,
): [number, number] {
  const log = scale === "log"
  const usable = values.filter((value) => Number.isFinite(value) && (!log || value > 0))
  if (usable.length === 0) return log ? [0.1, 10] : [0, 1]
  const measure = (value: number) => (log ? Math.log(value) : value)
  const low = usable.reduce((least, value) => Math.min(least, measure(value)), Infinity)
  const high = usable.reduce((most, value) => Math.max(most, measure(value)), -Infinity)
  const span = high - low || (log ? Math.LN10 : Math.abs(high) || 1)
  const [from, to] = [low - margin * span, high + margin * span]
  if (!log) return [from, to]
  const snap = (end: number, outermost: number) => snapToDecade(end, outermost, 0.06 * span, 0.02 * span)
  // Written out and read back, so that a decade is 0.01 and not its neighbour.
  return [snap(from, low), snap(to, high)].map((end) => Number(Math.exp(end).toPrecision(12))) as [
    number,
    number,
  ]
}
