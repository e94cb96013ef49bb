import type { Data, Mark } from "vega"
import type { FrameLabel, Frame, TextPlace } from "../chart/drawing"
import { dataSet, linePath, pathMark } from "../chart/marks"
import type { FramePositions } from "../chart/position"
import { tint } from "../chart/tint"
import type { PlottedRule } from "./curve-panel"

const ruleColor = "#595959"
const stripColor = tint(ruleColor, 0.18)

export interface DrawnRules {
  readonly data: readonly Data[]
  /** Strips lie under the curves, lines over the bands. */
  readonly strips: readonly Mark[]
  readonly lines: readonly Mark[]
  readonly labels: readonly FrameLabel[]
}

/** Draws values of theory, plateaus and the like as lines or strips across the frame, each with its label beside it. */
export function drawRules(
  rules: readonly PlottedRule[],
  at: FramePositions,
  { widthPt, heightPt, look }: Frame,
): DrawnRules {
  if (rules.length === 0) return { data: [], strips: [], lines: [], labels: [] }
  const place = ({ axis, from }: PlottedRule, value = from) => (axis === "x" ? at.x(value) : at.y(value))
  const across = (rule: PlottedRule, p: number) =>
    rule.axis === "x"
      ? linePath({ x: p, y: 0 }, { x: p, y: heightPt })
      : linePath({ x: 0, y: p }, { x: widthPt, y: p })
  const strips = rules.flatMap((rule) => {
    if (rule.to === undefined) return []
    const [a, b] = [place(rule), place(rule, rule.to)]
    const corners = rule.axis === "x" ? `M${a},0H${b}V${heightPt}H${a}Z` : `M0,${a}V${b}H${widthPt}V${a}Z`
    return Number.isFinite(a) && Number.isFinite(b) ? [{ path: corners }] : []
  })
  const lines = rules.flatMap((rule) => (rule.to === undefined ? [{ path: across(rule, place(rule)) }] : []))
  const gap = 0.3 * look.smallPt
  const fromFrame = look.tickLengthPt + gap
  const labels = rules.flatMap((rule): FrameLabel[] => {
    if (rule.label === null) return []
    const p = rule.to === undefined ? place(rule) : (place(rule) + place(rule, rule.to)) / 2
    const beside = (share: number, side: -1 | 1): TextPlace =>
      rule.axis === "y"
        ? {
            x: Math.min(Math.max(share * widthPt, fromFrame), widthPt - fromFrame),
            y: p + side * gap,
            align: share < 0.5 ? "left" : share > 0.5 ? "right" : "center",
            baseline: side < 0 ? "bottom" : "top",
            angle: 0,
          }
        : {
            x: p + side * gap,
            y: share * heightPt,
            align: side < 0 ? "right" : "left",
            baseline: "middle",
            angle: 0,
          }
    const places = [1, 0, 0.5, 0.25, 0.75].flatMap((share) => [
      beside(rule.axis === "x" ? 0.08 + 0.84 * share : share, -1),
      beside(rule.axis === "x" ? 0.08 + 0.84 * share : share, 1),
    ])
    return [{ text: rule.label, color: ruleColor, small: true, places }]
  })
  const dash = [5 * look.curveWidthPt, 2 * look.curveWidthPt]
  return {
    data: [dataSet("strips", strips), dataSet("rules", lines)],
    strips: [
      {
        type: "path",
        from: { data: "strips" },
        encode: { enter: { path: { field: "path" }, fill: { value: stripColor } } },
      },
    ],
    lines: [pathMark("rules", { color: ruleColor, widthPt: look.curveWidthPt, dash })],
    labels,
  }
}
