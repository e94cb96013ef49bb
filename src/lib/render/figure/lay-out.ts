import type { Frame, Look, PanelDrawing } from "@specs/chart/drawing"
import { firstMargins, mostRounds, sameMargins } from "@specs/chart/fit-frame"
import type { MeasureLabel, TextShape } from "@specs/chart/shape"
import { marginsOf, surroundingTexts, type Margins } from "@specs/chart/surroundings"
import { drawPanel } from "@specs/draw-panel"
import type { PanelResult } from "@specs/figure-kind"
import type { FigureSpec } from "@specs/figure-spec"
import type { AnyKind } from "@specs/kinds"
import type { PanelParams } from "@specs/registry"
import { SpecError } from "@specs/spec-error"
import { gridFrames, type FrameRect } from "./grid-frames"
import { pointsPerMm } from "./outer-svg"
import { withoutRepeatedLabels, withSharedDomains } from "./shared-axes"

/** Free space at the rim of the page. */
const edge = 1.5
/** Least side of a frame in which a plot can be read. */
const leastFramePt = 24

/** A panel in its final place. */
export interface LaidPanel {
  readonly drawing: PanelDrawing
  readonly rect: FrameRect
  readonly frame: Frame
  readonly texts: readonly TextShape[]
}

interface Setting {
  readonly spec: FigureSpec
  readonly results: readonly PanelResult[]
  /** Look of each panel. */
  readonly looks: readonly Look[]
  readonly kindOf: (kind: PanelParams["kind"]) => Pick<AnyKind, "build">
  readonly measure: MeasureLabel
}

/** Draws all panels for given frames; kinds choose ticks by the room that they have. */
function drawAll({ spec, results, kindOf }: Setting, frames: readonly Frame[]): readonly PanelDrawing[] {
  const draw = (panels: FigureSpec["panels"]) =>
    panels.map((panel, index) => {
      const result = results[index]
      if (!result) throw new Error(`Panel ${index + 1} has no result.`)
      return drawPanel(panel, result, frames[index]!, kindOf(panel.kind))
    })
  const alone = draw(spec.panels)
  if (!spec.grid.shareX && !spec.grid.shareY) return alone
  const together = draw([...withSharedDomains(spec.panels, alone, spec.grid)])
  return together.map((drawing, index) => withoutRepeatedLabels(drawing, spec.panels, index, spec.grid))
}

/** The title of a panel, centred above its frame, or above the numbers of its upper axis. */
function titleText(
  title: string | undefined,
  { axes }: PanelDrawing,
  texts: readonly TextShape[],
  frame: Frame,
  measure: MeasureLabel,
): readonly TextShape[] {
  if (!title) return []
  const { fontPt } = frame.look
  const above = axes.top ? marginsOf(texts, frame, measure).top : 0
  const place = {
    x: frame.widthPt / 2,
    y: -above - 0.5 * fontPt,
    align: "center",
    baseline: "alphabetic",
    angle: 0,
  } as const
  return [{ type: "text", text: title, ...place, fontPt, color: "#000000", bold: false }]
}

function checkRoom(rects: readonly FrameRect[]): void {
  const small = rects.findIndex(({ width, height }) => width < leastFramePt || height < leastFramePt)
  if (small < 0) return
  const side = rects[small]!.width < leastFramePt ? "wide" : "high"
  const message = `Panel ${small + 1} would be less than ${Math.round(leastFramePt / pointsPerMm)} mm ${side} beside its labels: make the figure larger or its labels shorter.`
  throw new SpecError([{ pointer: "/size", code: "figure-too-small", message }])
}

/**
 * Finds frames and drawings that agree: margins follow from labels, labels from ticks, ticks from the frames. Two rounds
 * settle all but odd cases; margins that still change after that are taken as they are.
 *
 * @throws SpecError figure-too-small
 */
export function layOut(setting: Setting): readonly LaidPanel[] {
  const { spec, looks, measure } = setting
  const page = { width: spec.size.widthMm * pointsPerMm, height: spec.size.heightMm * pointsPerMm }
  const gapPt = Math.max(...looks.map(({ fontPt }) => fontPt))
  const gaps = {
    columns: spec.grid.shareY ? 0.5 * gapPt : gapPt,
    rows: spec.grid.shareX ? 0.5 * gapPt : 0.8 * gapPt,
  }
  let margins: readonly Margins[] = spec.panels.map(() => firstMargins)
  for (let round = 0; ; round += 1) {
    const placed = spec.panels.map(({ place }, index) => ({ ...place, margins: margins[index]! }))
    const rects = gridFrames(placed, spec.grid, page, { edge, gaps })
    checkRoom(rects)
    const frames = rects.map(({ width, height }, index): Frame => ({
      widthPt: width,
      heightPt: height,
      look: looks[index]!,
    }))
    const drawings = drawAll(setting, frames)
    const texts = drawings.map((drawing, index) => {
      const around = surroundingTexts(drawing, frames[index]!, measure)
      return [...around, ...titleText(spec.panels[index]!.title, drawing, around, frames[index]!, measure)]
    })
    const needed = texts.map((around, index) => marginsOf(around, frames[index]!, measure))
    if (needed.every((need, index) => sameMargins(need, margins[index]!)) || round === mostRounds)
      return drawings.map((drawing, index) => ({
        drawing,
        rect: rects[index]!,
        frame: frames[index]!,
        texts: texts[index]!,
      }))
    margins = needed
  }
}
