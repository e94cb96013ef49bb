import type { Law } from "./law"

/** y = intercept + slope t. */
export const straightLine: Law = {
  id: "straight-line",
  tex: "y_0 + v t",
  parameters: ["intercept", "slope"],
  positiveTimes: false,
  rivals: [],
  simplerAt: [],
  curve: {
    parameters: 2,
    value(t, [intercept, slope], slopes) {
      slopes[0] = 1
      slopes[1] = t
      return intercept! + slope! * t
    },
  },
  raw: (t) => {
    // Centred, so that level and slope are determined apart however late the window begins.
    const centre = t.reduce((sum, value) => sum + value, 0) / t.length
    return {
      low: new Float64Array(0),
      high: new Float64Array(0),
      grid: [new Float64Array(0)],
      model: {
        shapes: 0,
        coefficients: 2,
        evaluate(time, _shapes, out) {
          out.terms[0] = 1
          out.terms[1] = time - centre
        },
      },
      assemble: (_shapes, [level, slope]) => Float64Array.of(level! - slope! * centre, slope!),
    }
  },
}
