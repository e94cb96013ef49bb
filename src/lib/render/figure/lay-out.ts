import type { Frame, Look, PanelDrawing } from "@specs/chart/drawing"
import { firstMargins, fitFrame, mostRounds, sameMargins } from "@specs/chart/fit-frame"
import type { MeasureLabel, TextShape } from "@specs/chart/shape"
import { marginsOf, surroundingTexts, type Margins } from "@specs/chart/surroundings"
import { drawPanel } from "@specs/draw-panel"
import type { PanelResult } from "@specs/figure-kind"
import type { FigureSpec } from "@specs/figure-spec"
import type { AnyKind } from "@specs/kinds"
import type { PanelParams } from "@specs/registry"
import { SpecError, type SpecIssue } from "@specs/spec-error"
import { gridFrames, type FrameRect } from "./grid-frames"
import { pointsPerMm } from "./outer-svg"
import { isGridPanel, isInset, type GridPanel, type InsetPanel, type Panel } from "./panel-places"
import { withoutRepeatedBars, withoutRepeatedLabels, withSharedDomains } from "./shared-axes"

/** Free space at the rim of the page. */
const edge = 1.5
/** Least side of a frame in which a plot can be read. */
const leastFramePt = 24

/** A panel in its final place. */
export interface LaidPanel {
  /** Its place in the spec's list. */
  readonly index: number
  readonly drawing: PanelDrawing
  /** Its frame on the page. */
  readonly rect: FrameRect
  readonly frame: Frame
  readonly texts: readonly TextShape[]
}

export interface LaidInset extends LaidPanel {
  readonly host: number
  /** All that the inset takes of the page, with its numbers and titles. */
  readonly outer: FrameRect
}

export interface Setting {
  readonly spec: FigureSpec
  readonly results: readonly PanelResult[]
  /** Look of each panel. */
  readonly looks: readonly Look[]
  readonly kindOf: (kind: PanelParams["kind"]) => Pick<AnyKind, "build">
  readonly measure: MeasureLabel
}

function draw({ results, kindOf }: Setting, panel: Panel, index: number, frame: Frame): PanelDrawing {
  const result = results[index]
  if (!result) throw new Error(`Panel ${index + 1} has no result.`)
  return drawPanel(panel, result, frame, kindOf(panel.kind))
}

interface Numbered {
  readonly panel: GridPanel
  readonly index: number
}

/** Draws the panels of the grid for given frames; kinds choose ticks by the room that they have. */
function drawGrid(setting: Setting, numbered: readonly Numbered[], frames: readonly Frame[]) {
  const { grid } = setting.spec
  const panels = numbered.map(({ panel }) => panel)
  const drawAll = (all: readonly GridPanel[]) =>
    all.map((panel, k) => draw(setting, panel, numbered[k]!.index, frames[k]!))
  const alone = drawAll(panels)
  const together = grid.shareX || grid.shareY ? drawAll(withSharedDomains(panels, alone, grid)) : alone
  const labelled = together.map((drawing, k) => withoutRepeatedLabels(drawing, panels, k, grid))
  return withoutRepeatedBars(labelled, panels)
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

const hasRoom = ({ width, height }: FrameRect): boolean => width >= leastFramePt && height >= leastFramePt

function tooSmall(pointer: string, rect: FrameRect, whole: string): SpecError {
  const side = rect.width < leastFramePt ? "wide" : "high"
  const least = Math.round(leastFramePt / pointsPerMm)
  const message = `This leaves a plot less than ${least} mm ${side} beside its labels: make the ${whole} larger or its labels shorter.`
  return new SpecError([{ pointer, code: "figure-too-small", message }])
}

/** The issue of a title that is longer than the page, if one is why there is no room. */
function tooLong(
  texts: readonly (readonly TextShape[])[],
  numbered: readonly Numbered[],
  page: { readonly width: number; readonly height: number },
  measure: MeasureLabel,
): SpecError | null {
  const issues = texts.flatMap((around, k) =>
    around.flatMap((text): SpecIssue[] => {
      const length = measure(text.text, text.bold).widthEm * text.fontPt
      const room = text.angle === 0 ? page.width : page.height
      if (length <= room) return []
      const where = text.angle === 0 ? "axes/x/label" : "axes/y/label"
      const message = `This text is ${Math.round(length / pointsPerMm)} mm long; the figure has ${Math.round(room / pointsPerMm)} mm.`
      return [{ pointer: `/panels/${numbered[k]!.index}/${where}`, code: "label-too-long", message }]
    }),
  )
  return issues.length > 0 ? new SpecError(issues) : null
}

/**
 * Finds frames and drawings that agree: margins follow from labels, labels from ticks, ticks from the frames. Two rounds
 * settle all but odd cases; margins that still change after that are taken as they are.
 *
 * @throws SpecError figure-too-small, label-too-long
 */
export function layOutGrid(setting: Setting): readonly LaidPanel[] {
  const { spec, looks, measure } = setting
  const numbered = spec.panels.flatMap((panel, index) => (isGridPanel(panel) ? [{ panel, index }] : []))
  const page = { width: spec.size.widthMm * pointsPerMm, height: spec.size.heightMm * pointsPerMm }
  const gapPt = Math.max(...looks.map(({ fontPt }) => fontPt))
  const gaps = {
    columns: spec.grid.shareY ? 0.5 * gapPt : gapPt,
    rows: spec.grid.shareX ? 0.5 * gapPt : 0.8 * gapPt,
  }
  let margins: readonly Margins[] = numbered.map(() => firstMargins)
  let texts: readonly (readonly TextShape[])[] = []
  for (let round = 0; ; round += 1) {
    const placed = numbered.map(({ panel }, k) => ({ ...panel.place, margins: margins[k]! }))
    const rects = gridFrames(placed, spec.grid, page, { edge, gaps })
    const cramped = rects.find((rect) => !hasRoom(rect))
    if (cramped) throw tooLong(texts, numbered, page, measure) ?? tooSmall("/size", cramped, "figure")
    const frames = rects.map(({ width, height }, k): Frame => ({
      widthPt: width,
      heightPt: height,
      look: looks[numbered[k]!.index]!,
    }))
    const drawings = drawGrid(setting, numbered, frames)
    texts = drawings.map((drawing, k) => {
      const around = surroundingTexts(drawing, frames[k]!, measure)
      return [...around, ...titleText(numbered[k]!.panel.title, drawing, around, frames[k]!, measure)]
    })
    const needed = texts.map((around, k) => marginsOf(around, frames[k]!, measure))
    if (needed.every((need, k) => sameMargins(need, margins[k]!)) || round === mostRounds)
      return drawings.map((drawing, k) => ({
        index: numbered[k]!.index,
        drawing,
        rect: rects[k]!,
        frame: frames[k]!,
        texts: texts[k]!,
      }))
    margins = needed
  }
}

/** An inset's look: type no smaller than the figure's numbers, all that is drawn a little finer. */
function insetLook(look: Look): Look {
  return {
    ...look,
    fontPt: look.smallPt,
    markerSizePt: 0.8 * look.markerSizePt,
    tickLengthPt: 0.7 * look.tickLengthPt,
    minorTickLengthPt: 0.7 * look.minorTickLengthPt,
    labelGapPt: 0.7 * look.labelGapPt,
  }
}

function layOutInset(setting: Setting, panel: InsetPanel, index: number, host: FrameRect): LaidInset {
  const { x, y, width, height, inside } = panel.place
  const outer = {
    x: host.x + x * host.width,
    y: host.y + (1 - y - height) * host.height,
    width: width * host.width,
    height: height * host.height,
  }
  const look = insetLook(setting.looks[index]!)
  const { drawing, frame, margins, texts } = fitFrame(
    (wanted) => draw(setting, panel, index, wanted),
    look,
    outer,
    setting.measure,
    0,
  )
  const rect = {
    x: outer.x + margins.left,
    y: outer.y + margins.top,
    width: outer.width - margins.left - margins.right,
    height: outer.height - margins.top - margins.bottom,
  }
  if (!hasRoom(rect)) throw tooSmall(`/panels/${index}/place`, rect, "inset")
  return { index, host: inside - 1, drawing, rect, outer, frame, texts }
}

/** Lays the insets of a figure into the frames of their panels. @throws SpecError figure-too-small */
export function layOutInsets(setting: Setting, grid: readonly LaidPanel[]): readonly LaidInset[] {
  return setting.spec.panels.flatMap((panel, index) => {
    if (!isInset(panel)) return []
    const host = grid.find((laid) => laid.index === panel.place.inside - 1)!
    return [layOutInset(setting, panel, index, host.rect)]
  })
}
