import type { Curve } from "@/lib/stats/nonlinear/curve-problem"

const rational = (
  x: number,
  top: number,
  bottom: number,
  slopes: Float64Array,
  from: number,
  powers: number[],
) => powers.forEach((power, k) => (slopes[from + k] = (-top * x ** power) / bottom ** 2))

/** The model curves of the NIST sets with their derivatives, in the notation of each file's `model`. */
export const nistModels: Record<string, Curve> = {
  Misra1a: {
    parameters: 2,
    value(x, b, slopes) {
      slopes[0] = -Math.expm1(-b[1]! * x)
      slopes[1] = b[0]! * x * Math.exp(-b[1]! * x)
      return b[0]! * slopes[0]
    },
  },
  DanWood: {
    parameters: 2,
    value(x, b, slopes) {
      slopes[0] = x ** b[1]!
      slopes[1] = b[0]! * slopes[0] * Math.log(x)
      return b[0]! * slopes[0]
    },
  },
  MGH09: {
    parameters: 4,
    value(x, b, slopes) {
      const top = x * x + x * b[1]!
      const bottom = x * x + x * b[2]! + b[3]!
      slopes[0] = top / bottom
      slopes[1] = (b[0]! * x) / bottom
      rational(x, b[0]! * top, bottom, slopes, 2, [1, 0])
      return (b[0]! * top) / bottom
    },
  },
  Hahn1: {
    parameters: 7,
    value(x, b, slopes) {
      const top = b[0]! + x * (b[1]! + x * (b[2]! + x * b[3]!))
      const bottom = 1 + x * (b[4]! + x * (b[5]! + x * b[6]!))
      for (let k = 0; k < 4; k += 1) slopes[k] = x ** k / bottom
      rational(x, top, bottom, slopes, 4, [1, 2, 3])
      return top / bottom
    },
  },
  Lanczos3: {
    parameters: 6,
    value(x, b, slopes) {
      let sum = 0
      for (const k of [0, 2, 4]) {
        slopes[k] = Math.exp(-b[k + 1]! * x)
        slopes[k + 1] = -x * b[k]! * slopes[k]!
        sum += b[k]! * slopes[k]!
      }
      return sum
    },
  },
}
