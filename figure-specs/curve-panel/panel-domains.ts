import { paddedDomain } from "../chart/axis"
import type { AxisWish, CurvePanel } from "./curve-panel"

/** Scale and domain of an axis: those of the spec where it gives them, else what the values need. */
function domainOf(wish: AxisWish, values: readonly number[], margin: number) {
  const scale = wish.params.scale ?? wish.scale
  const all = [...values, ...(wish.include ?? [])]
  return { scale, domain: wish.params.domain ?? paddedDomain(all, scale, margin) }
}

/** Domains that show all points with their bars, all solid lines and all rules of a panel. */
export function panelDomains(panel: CurvePanel) {
  const xScale = panel.x.params.scale ?? panel.x.scale
  const yScale = panel.y.params.scale ?? panel.y.scale
  const onX = (x: number) => xScale === "linear" || x > 0
  const solid = panel.curves.flatMap(({ lines }) =>
    lines.flatMap(({ x, y, outside }) =>
      x.flatMap((value, k) => (outside?.[k] || !onX(value) ? [] : [{ x: value, y: y[k]! }])),
    ),
  )
  const points = panel.curves.flatMap((curve) => curve.points).filter(({ x }) => onX(x))
  // A bar that reaches far below its point would squeeze everything else: on a log axis it may be cut.
  const ends = points.flatMap(({ y, low, high }) => [
    y,
    high ?? y,
    yScale === "log" ? Math.max(low ?? y, y / 3) : (low ?? y),
  ])
  const bands =
    yScale === "log"
      ? []
      : panel.curves.flatMap(({ bands: all }) => all.flatMap(({ low, high }) => [...low, ...high]))
  const rules = (axis: "x" | "y") =>
    panel.rules
      .filter((rule) => rule.axis === axis)
      .flatMap(({ from, to }) => (to === undefined ? [from] : [from, to]))
  return {
    x: domainOf(panel.x, [...points.map(({ x }) => x), ...solid.map(({ x }) => x), ...rules("x")], 0.03),
    y: domainOf(panel.y, [...ends, ...solid.map(({ y }) => y), ...bands, ...rules("y")], 0.06),
  }
}
