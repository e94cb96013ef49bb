import type { Data, Mark } from "vega"
import type { AxisDrawing, Frame, FrameLabel } from "./drawing"
import { exponentTex } from "./exponent-label"
import { dataSet, linePath, pathMark } from "./marks"
import type { FramePositions } from "./position"
import { labelAlong, placeSlopeGuide } from "./slope-guide"

const guideColor = "#595959"

export interface ReferenceGuides {
  readonly data: readonly Data[]
  readonly marks: readonly Mark[]
  readonly labels: readonly FrameLabel[]
}

/**
 * Reference slopes beside the curves of a panel, each with its label along it. A power law is a straight line on two
 * logarithmic axes only; on others there are none.
 *
 * @param wish.symbol TeX of the abscissa, for labels that are not given
 * @param wish.curves points of all curves, in points of the frame
 * @param wish.stretch part of the frame in which a guide is of use, left to right
 */
export function referenceGuides(
  references: readonly { readonly exponent: number; readonly label?: string | undefined }[],
  wish: {
    readonly symbol: string
    readonly curves: readonly { readonly x: number; readonly y: number }[]
    readonly stretch: readonly [number, number]
    readonly axes: { readonly x: AxisDrawing; readonly y: AxisDrawing }
    readonly at: FramePositions
  },
  { widthPt, heightPt, look }: Frame,
): ReferenceGuides {
  const { axes, at, symbol, stretch } = wish
  const straight = axes.x.scale === "log" && axes.y.scale === "log"
  if (!straight || references.length === 0) return { data: [], marks: [], labels: [] }
  const perDecadeX = at.x(10) - at.x(1)
  const perDecadeY = at.y(10) - at.y(1)
  const curves = [...wish.curves]
  const paths: { path: string }[] = []
  const labels: FrameLabel[] = []
  const labelPt = 1.35 * look.smallPt
  const gapPt = 1.4 * look.smallPt
  for (const { exponent, label } of references) {
    const slope = (exponent * perDecadeY) / perDecadeX
    const guide = placeSlopeGuide(slope, { widthPt, heightPt, curves, stretch, labelPt, gapPt })
    if (!guide) continue
    const { from, to, side } = guide
    paths.push({ path: linePath(from, to) })
    labels.push(labelAlong(label ?? `$${symbol}^{${exponentTex(exponent)}}$`, guideColor, guide, 2))
    // The next guide keeps clear of this one and its label.
    const clear = side === "above" ? -labelPt : labelPt
    for (let k = 0; k <= 10; k += 1) {
      const [x, y] = [from.x + (k / 10) * (to.x - from.x), from.y + (k / 10) * (to.y - from.y)]
      curves.push({ x, y }, { x, y: y + clear })
    }
  }
  const dash = [5 * look.curveWidthPt, 2 * look.curveWidthPt]
  return {
    data: [dataSet("references", paths)],
    marks: [pathMark("references", { color: guideColor, widthPt: look.curveWidthPt, dash })],
    labels,
  }
}
