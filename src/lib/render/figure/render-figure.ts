import { insideShapes } from "@specs/chart/inside-shapes"
import type { Frame, Look, PanelDrawing } from "@specs/chart/drawing"
import { frameShape } from "@specs/chart/axis-shapes"
import { defaultLook } from "@specs/chart/look"
import { marginsOf, surroundingTexts, type Margins } from "@specs/chart/surroundings"
import type { PanelResult } from "@specs/figure-kind"
import type { FigureSpec } from "@specs/figure-spec"
import { drawMarks } from "../panel/draw-marks"
import { typesetterFor, type Typesetter } from "../typeset/typesetter"
import { fontRules } from "../svg/embed-fonts"
import { checkLabels } from "./check-labels"
import { gridFrames, type FrameRect } from "./grid-frames"
import { outerSvg, pointsPerMm } from "./outer-svg"
import { panelBuilders, type PanelBuilders } from "./panel-builders"
import { movedSvg, shapesSvg } from "./shape-svg"

/** A figure at its printed size. */
export interface RenderedFigure {
  readonly svg: string
  readonly widthMm: number
  readonly heightMm: number
  readonly alternativeText: string
  /** What the caption must say about the drawing, one sentence each. */
  readonly notes: readonly string[]
}

const edge = 1.5

interface LaidPanel {
  readonly drawing: PanelDrawing
  readonly rect: FrameRect
  readonly frame: Frame
}

/** Builds all panels for given frames; kinds decide ticks by the room they have. */
function buildAll(
  spec: FigureSpec,
  results: readonly PanelResult[],
  frames: readonly Frame[],
  builders: PanelBuilders,
): readonly PanelDrawing[] {
  return spec.panels.map((panel, index) => {
    const builder = builders[panel.kind]
    const result = results[index]
    if (!builder || !result)
      throw new Error(`Panel ${index + 1}: no ${builder ? "result" : "kind"} for ${panel.kind}.`)
    return builder(result, panel, frames[index]!)
  })
}

/**
 * Finds frames and drawings that agree: margins follow from labels, labels from ticks, ticks from the frame. Two rounds
 * settle all but odd cases; after four the last margins stand, which can only leave a little more room than needed.
 */
function layOut(
  spec: FigureSpec,
  results: readonly PanelResult[],
  look: Look,
  builders: PanelBuilders,
  { measure }: Typesetter,
): readonly LaidPanel[] {
  const page = { width: spec.size.widthMm * pointsPerMm, height: spec.size.heightMm * pointsPerMm }
  let margins: readonly Margins[] = spec.panels.map(() => ({ left: 36, right: 6, top: 4, bottom: 28 }))
  for (let round = 0; ; round += 1) {
    const placed = spec.panels.map(({ place }, index) => ({ ...place, margins: margins[index]! }))
    const rects = gridFrames(placed, spec.grid, page, { edge, gap: look.fontPt })
    const frames = rects.map(({ width, height }): Frame => ({ widthPt: width, heightPt: height, look }))
    const drawings = buildAll(spec, results, frames, builders)
    const needed = drawings.map((drawing, index) => {
      const frame = frames[index]!
      return marginsOf(surroundingTexts(drawing, frame, measure), frame, measure)
    })
    const settled = needed.every((need, index) =>
      (["left", "right", "top", "bottom"] as const).every(
        (side) => Math.abs(need[side] - margins[index]![side]) < 0.01,
      ),
    )
    if (settled || round === 4)
      return drawings.map((drawing, index) => ({ drawing, rect: rects[index]!, frame: frames[index]! }))
    margins = needed
  }
}

async function panelSvg(panel: LaidPanel, index: number, typesetter: Typesetter): Promise<string> {
  const { drawing, rect, frame } = panel
  const { measure } = typesetter
  const marks = await drawMarks(drawing.spec, `panel-${index + 1}-`)
  const around = [frameShape(drawing.axes, frame, frame.look), ...surroundingTexts(drawing, frame, measure)]
  const inside = insideShapes(drawing, frame, marks.ink, measure, true)
  return movedSvg(rect.x, rect.y, marks.svg + shapesSvg([...around, ...inside], typesetter))
}

/**
 * Draws a figure at its exact size.
 *
 * @param spec a figure spec with defaults filled in
 * @param results one result a panel, in the order of the spec
 * @param options.look changes to the default look, such as a house look
 */
export async function renderFigure(
  spec: FigureSpec,
  results: readonly PanelResult[],
  { look: changes = {}, builders = panelBuilders }: { look?: Partial<Look>; builders?: PanelBuilders } = {},
): Promise<RenderedFigure> {
  const look = { ...defaultLook, ...changes }
  const typesetter = await typesetterFor(look.fontFamily)
  checkLabels(spec, typesetter)
  const panels = layOut(spec, results, look, builders, typesetter)
  const bodies: string[] = []
  for (const [index, panel] of panels.entries()) bodies.push(await panelSvg(panel, index, typesetter))
  const body = bodies.join("")
  const alternativeText = panels.map(({ drawing }) => drawing.alternativeText).join(" ")
  const { widthMm, heightMm } = spec.size
  const svg = outerSvg({
    widthMm,
    heightMm,
    title: spec.title || "Figure",
    description: alternativeText,
    body,
    style: await fontRules(body),
  })
  return { svg, widthMm, heightMm, alternativeText, notes: panels.flatMap(({ drawing }) => drawing.notes) }
}
