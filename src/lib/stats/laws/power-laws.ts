import { spaced, type Law, type ScaledLaw } from "./law"

const widest = 8
const exponents = [0.1, 0.25, 0.5, 0.75, 1, 1.5, 2, 3, 4, 6].flatMap((b) => [-b, b])

/** Shape: the exponent b itself; terms t^b and, with an offset, 1. */
function scaledPowerLaw(offset: boolean, t: Float64Array): ScaledLaw {
  // Times relative to the middle of the window keep the powers near 1 and their derivative short.
  const middle = Math.exp((Math.log(t[0]!) + Math.log(t[t.length - 1]!)) / 2)
  return {
    low: Float64Array.of(-widest),
    high: Float64Array.of(widest),
    grid: exponents.map((b) => Float64Array.of(b)),
    model: {
      shapes: 1,
      coefficients: offset ? 2 : 1,
      evaluate(time, [b], out) {
        const x = Math.log(time / middle)
        out.terms[0] = Math.exp(b! * x)
        out.termSlopes[0] = x * out.terms[0]
        if (!offset) return
        out.terms[1] = 1
        out.termSlopes[1] = 0
      },
    },
    assemble: ([b], [level, constant]) => {
      const amplitude = level! * middle ** -b!
      return offset ? Float64Array.of(amplitude, b!, constant!) : Float64Array.of(amplitude, b!)
    },
  }
}

/** y = A t^b on the values themselves, for means whose logarithm is not defined. */
export const powerLaw: Law = {
  id: "power-law",
  tex: "A\\,t^{b}",
  parameters: ["amplitude", "exponent"],
  positiveTimes: true,
  rivals: [],
  simplerAt: [],
  curve: {
    parameters: 2,
    value(t, [amplitude, b], slopes) {
      slopes[0] = t ** b!
      slopes[1] = amplitude! * slopes[0] * Math.log(t)
      return amplitude! * slopes[0]
    },
  },
  raw: (t) => scaledPowerLaw(false, t),
}

/** y = A t^b + c; for widths fit the square, C + A t^(2 beta), whose offset is the intrinsic width. */
export const powerLawOffset: Law = {
  id: "power-law-offset",
  tex: "A\\,t^{b} + c",
  parameters: ["amplitude", "exponent", "offset"],
  positiveTimes: true,
  rivals: [["exponent", "offset"]],
  simplerAt: [{ parameter: "offset", value: 0, words: "zero" }],
  curve: {
    parameters: 3,
    value(t, [amplitude, b, offset], slopes) {
      slopes[0] = t ** b!
      slopes[1] = amplitude! * slopes[0] * Math.log(t)
      slopes[2] = 1
      return amplitude! * slopes[0] + offset!
    },
  },
  raw: (t) => scaledPowerLaw(true, t),
}

/**
 * y = A (t* - t)^-g with t* after the last time of the window. Shape: u = ln(t* - t_last) from 1e-3 to 1e2 window
 * lengths; on the raw scale also g.
 */
export const finiteTimeDivergence: Law = {
  id: "finite-time-divergence",
  tex: "A\\,(t^\\ast - t)^{-g}",
  parameters: ["amplitude", "singularTime", "divergenceExponent"],
  positiveTimes: false,
  rivals: [["singularTime", "divergenceExponent"]],
  simplerAt: [],
  curve: {
    parameters: 3,
    value(t, [amplitude, singular, g], slopes) {
      const left = singular! - t
      slopes[0] = left ** -g!
      slopes[1] = (-g! * amplitude! * slopes[0]) / left
      slopes[2] = -amplitude! * slopes[0] * Math.log(left)
      return amplitude! * slopes[0]
    },
  },
  raw: (t) => {
    const { last, low, high } = nearness(t)
    return {
      low: Float64Array.of(low, 0.01),
      high: Float64Array.of(high, widest),
      grid: Array.from(spaced(low, high, 40)).flatMap((u) =>
        [0.25, 0.5, 1, 2, 4].map((g) => Float64Array.of(u, g)),
      ),
      model: {
        shapes: 2,
        coefficients: 1,
        evaluate(time, [u, g], out) {
          const gap = Math.exp(u!)
          const left = gap + (last - time)
          out.terms[0] = left ** -g!
          out.termSlopes[0] = (-g! * out.terms[0] * gap) / left
          out.termSlopes[1] = -out.terms[0] * Math.log(left)
        },
      },
      assemble: ([u, g], [amplitude]) => Float64Array.of(amplitude!, last + Math.exp(u!), g!),
    }
  },
  log: (t) => {
    const { last, low, high } = nearness(t)
    return {
      low: Float64Array.of(low),
      high: Float64Array.of(high),
      grid: Array.from(spaced(low, high, 200), (u) => Float64Array.of(u)),
      model: {
        shapes: 1,
        coefficients: 2,
        evaluate(time, [u], out) {
          const gap = Math.exp(u!)
          const left = gap + (last - time)
          out.terms[0] = 1
          out.terms[1] = Math.log(left)
          out.termSlopes[0] = 0
          out.termSlopes[1] = gap / left
        },
      },
      assemble: ([u], [level, slope]) => Float64Array.of(Math.exp(level!), last + Math.exp(u!), -slope!),
    }
  },
}

/** Range of u = ln(t* - t_last). */
function nearness(t: Float64Array) {
  const last = t[t.length - 1]!
  const length = last - t[0]!
  return { last, low: Math.log(1e-3 * length), high: Math.log(1e2 * length) }
}
