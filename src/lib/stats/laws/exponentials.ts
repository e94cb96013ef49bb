import gamma from "@stdlib/math-base-special-gamma"
import { productGrid, spaced, type Law, type ScaledLaw } from "./law"

const noShapes = { low: new Float64Array(0), high: new Float64Array(0), grid: [new Float64Array(0)] }
const stretchings = { low: Math.log(0.05), high: Math.log(2) }

/** Range of ln tau: from a tenth of the finest spacing to 10 000 window lengths. */
function relaxationRange(t: Float64Array) {
  let finest = Infinity
  for (let k = 1; k < t.length; k += 1) finest = Math.min(finest, t[k]! - t[k - 1]!)
  const length = t[t.length - 1]! - t[0]!
  return { low: Math.log(finest / 10), high: Math.log(1e4 * length), typical: Math.log(length) }
}

/** Shape: ln tau; terms exp(-t/tau) and, with an offset, 1. Amplitudes refer to the window's start inside. */
function rawExponential(offset: boolean, t: Float64Array): ScaledLaw {
  const start = t[0]!
  const { low, high, typical } = relaxationRange(t)
  return {
    low: Float64Array.of(low),
    high: Float64Array.of(high),
    grid: Array.from(spaced(Math.max(low, typical - 5), typical + 3, 24), (value) => Float64Array.of(value)),
    model: {
      shapes: 1,
      coefficients: offset ? 2 : 1,
      evaluate(time, [logTau], out) {
        const s = (time - start) * Math.exp(-logTau!)
        out.terms[0] = Math.exp(-s)
        out.termSlopes[0] = s * out.terms[0]
        if (!offset) return
        out.terms[1] = 1
        out.termSlopes[1] = 0
      },
    },
    assemble: ([logTau], [level, constant]) => {
      const tau = Math.exp(logTau!)
      const amplitude = level! * Math.exp(start / tau)
      return offset ? Float64Array.of(amplitude, tau, constant!) : Float64Array.of(amplitude, tau)
    },
  }
}

/** y = A exp(-t/tau). */
export const exponential: Law = {
  id: "exponential",
  tex: "A\\,\\mathrm{e}^{-t/\\tau}",
  parameters: ["amplitude", "relaxationTime"],
  positiveTimes: false,
  rivals: [],
  simplerAt: [],
  curve: {
    parameters: 2,
    value(t, [amplitude, tau], slopes) {
      slopes[0] = Math.exp(-t / tau!)
      slopes[1] = (amplitude! * slopes[0] * t) / tau! ** 2
      return amplitude! * slopes[0]
    },
  },
  raw: (t) => rawExponential(false, t),
  // A straight line; a rising one has no relaxation time.
  log: (t) => {
    const centre = t.reduce((sum, value) => sum + value, 0) / t.length
    return {
      ...noShapes,
      model: {
        shapes: 0,
        coefficients: 2,
        evaluate(time, _shapes, out) {
          out.terms[0] = 1
          out.terms[1] = centre - time
        },
      },
      assemble: (_shapes, [level, rate]) =>
        Float64Array.of(Math.exp(level! + rate! * centre), rate! > 0 ? 1 / rate! : Infinity),
    }
  },
}

/** y = A exp(-t/tau) + c. */
export const exponentialOffset: Law = {
  id: "exponential-offset",
  tex: "A\\,\\mathrm{e}^{-t/\\tau} + c",
  parameters: ["amplitude", "relaxationTime", "offset"],
  positiveTimes: false,
  rivals: [["relaxationTime", "offset"]],
  simplerAt: [{ parameter: "offset", value: 0, words: "zero" }],
  curve: {
    parameters: 3,
    value(t, [amplitude, tau, offset], slopes) {
      slopes[0] = Math.exp(-t / tau!)
      slopes[1] = (amplitude! * slopes[0] * t) / tau! ** 2
      slopes[2] = 1
      return amplitude! * slopes[0] + offset!
    },
  },
  raw: (t) => rawExponential(true, t),
}

/**
 * y = A exp(-(t/tau)^beta), 0.05 < beta < 2. Shapes: ln tau and ln beta; on the log scale ln beta alone, since ln y is
 * linear in ln A and tau^-beta.
 *
 * @see Kohlrausch, Ann. Phys. Chem. 91, 56 (1854)
 */
export const stretchedExponential: Law = {
  id: "stretched-exponential",
  tex: "A\\,\\mathrm{e}^{-(t/\\tau)^{\\beta}}",
  parameters: ["amplitude", "relaxationTime", "stretching"],
  positiveTimes: true,
  rivals: [["relaxationTime", "stretching"]],
  simplerAt: [{ parameter: "stretching", value: 1, words: "1" }],
  curve: {
    parameters: 3,
    value(t, [amplitude, tau, beta], slopes) {
      const s = (t / tau!) ** beta!
      slopes[0] = Math.exp(-s)
      slopes[1] = (amplitude! * slopes[0] * s * beta!) / tau!
      slopes[2] = -amplitude! * slopes[0] * s * Math.log(t / tau!)
      return amplitude! * slopes[0]
    },
  },
  raw: (t) => {
    const { low, high, typical } = relaxationRange(t)
    return {
      low: Float64Array.of(low, stretchings.low),
      high: Float64Array.of(high, stretchings.high),
      grid: productGrid(
        spaced(Math.max(low, typical - 6), typical + 3, 12),
        spaced(stretchings.low, stretchings.high, 7),
      ),
      model: {
        shapes: 2,
        coefficients: 1,
        evaluate(time, [logTau, logBeta], out) {
          const beta = Math.exp(logBeta!)
          const distance = Math.log(time) - logTau!
          const s = Math.exp(beta * distance)
          out.terms[0] = Math.exp(-s)
          // Far beyond tau the term is zero, and so are its slopes: infinity times zero is not.
          const slope = out.terms[0] === 0 ? 0 : beta * s * out.terms[0]
          out.termSlopes[0] = slope
          out.termSlopes[1] = -distance * slope
        },
      },
      assemble: ([logTau, logBeta], [amplitude]) =>
        Float64Array.of(amplitude!, Math.exp(logTau!), Math.exp(logBeta!)),
    }
  },
  log: (t) => {
    const middle = (Math.log(t[0]!) + Math.log(t[t.length - 1]!)) / 2
    return {
      low: Float64Array.of(stretchings.low),
      high: Float64Array.of(stretchings.high),
      grid: Array.from(spaced(stretchings.low, stretchings.high, 24), (value) => Float64Array.of(value)),
      model: {
        shapes: 1,
        coefficients: 2,
        evaluate(time, [logBeta], out) {
          const beta = Math.exp(logBeta!)
          const distance = Math.log(time) - middle
          const s = Math.exp(beta * distance)
          out.terms[0] = 1
          out.terms[1] = -s
          out.termSlopes[0] = 0
          out.termSlopes[1] = -beta * distance * s
        },
      },
      assemble: ([logBeta], [level, strength]) => {
        const beta = Math.exp(logBeta!)
        const tau = strength! > 0 ? Math.exp(middle - Math.log(strength!) / beta) : Infinity
        return Float64Array.of(Math.exp(level!), tau, beta)
      },
    }
  },
}

/**
 * Mean relaxation time of a stretched exponential, the area under it: (tau / beta) Gamma(1 / beta).
 *
 * @example meanRelaxationTime(2, 1) // 2
 */
export function meanRelaxationTime(tau: number, beta: number): number {
  return (tau / beta) * gamma(1 / beta)
}
