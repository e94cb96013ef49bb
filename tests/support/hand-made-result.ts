import type { DecayCurve, DecayResult } from "@specs/decay-exponent/result"

/** A deterministic scatter of size one around zero, so that hand-made curves look measured; not a random number. */
const scatter = (k: number) => Math.sin(12.9898 * k + 4.1) * 0.7 + Math.sin(78.233 * k) * 0.5

/** A curve n(t) = (1 + t/t0)^exponent with growing relative errors, on a logarithmic grid from 1 to 10^4. */
function handMadeCurve(
  curve: number | null,
  exponent: number,
  t0: number,
  points: number,
  shift: number,
): DecayCurve {
  const abscissa = Array.from({ length: points }, (_, k) => 10 ** ((4 * k) / (points - 1)))
  const relative = abscissa.map((t) => 0.004 + 0.0009 * t ** 0.5)
  const law = (t: number) => (1 + t / t0) ** exponent
  const mean = abscissa.map((t, k) => law(t) * (1 + 0.5 * relative[k]! * scatter(k + shift)))
  const window = [30, 3000] as const
  const grid = Array.from({ length: 81 }, (_, k) => 10 ** (1 + (2.98 * k) / 80))
  const line = grid.map((t) => (t / t0) ** exponent)
  const width = grid.map((t) => 0.02 + 0.02 * Math.abs(Math.log10(t / 300)))
  return {
    curve,
    trajectories: 400,
    abscissa,
    mean,
    standardError: mean.map((value, k) => value * relative[k]!),
    fit: {
      exponent,
      amplitude: t0 ** -exponent,
      window,
      grid,
      line,
      bandLow: line.map((value, k) => value * (1 - width[k]!)),
      bandHigh: line.map((value, k) => value * (1 + width[k]!)),
      outside: grid.map((t) => t < window[0] || t > window[1]),
    },
    quantities: [
      {
        name: "exponent",
        value: exponent,
        standardError: 0.006,
        interval: { level: 0.95, low: exponent - 0.012, high: exponent + 0.012, type: "jackknife-t" },
        text: `${exponent.toFixed(3).replace("-", "\u2212")}(6)`,
        tex: `${exponent.toFixed(3)}(6)`,
      },
    ],
  }
}

/** Results for tests and examples of drawing, made by hand so that they depend on no estimator. */
export function handMadeResult(curves: 1 | 3, points = 120): DecayResult {
  const all =
    curves === 1
      ? [handMadeCurve(null, -0.498, 1.6, points, 0)]
      : [
          handMadeCurve(0.1, -0.31, 2.5, points, 0),
          handMadeCurve(0.2, -0.5, 1.6, points, 40),
          handMadeCurve(0.4, -0.78, 1.4, points, 80),
        ]
  return {
    kind: "decay-exponent",
    curves: all,
    quantities: [],
    warnings: [],
    series: [],
    abscissa: { name: "t", unit: "1/J", symbol: "t" },
    observable: { name: "n", unit: null, symbol: "n", normalised: false },
    curveBy: curves === 1 ? null : { name: "nu", unit: null, symbol: "\\nu" },
  }
}
