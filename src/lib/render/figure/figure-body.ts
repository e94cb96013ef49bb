import { annotationShapes } from "@specs/chart/annotation-shapes"
import { insideShapes } from "@specs/chart/inside-shapes"
import { written } from "@specs/chart/position"
import { inkIn } from "@specs/chart/free-place"
import { boundsOf, textCorners, type Box, type Shape } from "@specs/chart/shape"
import { frameShapes } from "@specs/chart/surroundings"
import type { SpecIssue } from "@specs/spec-error"
import type { DrawnMarks } from "../panel/draw-marks"
import type { Typesetter } from "../typeset/typesetter"
import type { LaidInset, LaidPanel } from "./lay-out"
import { letterShapes } from "./panel-letters"
import { movedSvg, shapesSvg } from "./shape-svg"

/** Paper around an inset, in points, so that what lies under it ends a little before its labels. */
const insetPaper = 1.5

interface BodyParts {
  readonly grid: readonly LaidPanel[]
  readonly insets: readonly LaidInset[]
  /** Marks of all panels, in the order of the spec. */
  readonly marks: readonly DrawnMarks[]
  readonly letters: readonly string[]
  readonly typesetter: Typesetter
}

/** The boxes that an inset needs paper for, on the page: its frame and each of its texts, not the space between them. */
function paperOf({ rect, texts }: LaidInset, { measure }: Typesetter): readonly Box[] {
  const boxes = texts.map((text) => boundsOf(textCorners(text, measure(text.text, text.bold))))
  return [{ left: 0, top: 0, right: rect.width, bottom: rect.height }, ...boxes].map((box) => ({
    left: rect.x + box.left - insetPaper,
    top: rect.y + box.top - insetPaper,
    right: rect.x + box.right + insetPaper,
    bottom: rect.y + box.bottom + insetPaper,
  }))
}

const boxPath = ({ left, top, right, bottom }: Box) =>
  `M${written(left)},${written(top)}H${written(right)}V${written(bottom)}H${written(left)}Z`

const moved = (
  { left, top, right, bottom }: Box,
  { x, y }: { readonly x: number; readonly y: number },
): Box => ({
  left: left - x,
  top: top - y,
  right: right - x,
  bottom: bottom - y,
})

/** The box of an inset in the frame of its panel. */
function boxInHost({ outer: { x, y, width, height } }: LaidInset, { rect }: LaidPanel): Box {
  return moved({ left: x, top: y, right: x + width, bottom: y + height }, rect)
}

/** Points of a grid over a box: where an inset is, nothing else has room. */
function boxPoints({ left, top, right, bottom }: Box): (readonly [number, number])[] {
  const across = Math.ceil((right - left) / 3)
  const down = Math.ceil((bottom - top) / 3)
  return Array.from({ length: (across + 1) * (down + 1) }, (_, k) => [
    left + ((right - left) * (k % (across + 1))) / across,
    top + ((bottom - top) * Math.floor(k / (across + 1))) / down,
  ])
}

/** One panel on the page: what lies under its data, the data, and all type and lines over them. */
function panelSvg(
  { drawing, rect, frame, texts }: LaidPanel,
  { svg, ink }: DrawnMarks,
  typesetter: Typesetter,
  { legend, taken, letter }: { legend: boolean; taken: readonly Box[]; letter: readonly Shape[] },
): { readonly svg: string; readonly legendCoversData: boolean } {
  const { under } = annotationShapes(drawing.annotations ?? [], drawing, frame)
  const inside = insideShapes(drawing, frame, ink, typesetter.measure, { legend, taken })
  const over = [...frameShapes(drawing, frame), ...texts, ...letter, ...inside.shapes]
  const body = shapesSvg(under, typesetter) + svg + shapesSvg(over, typesetter)
  return { svg: movedSvg(rect.x, rect.y, body), legendCoversData: inside.legendCoversData }
}

const legendWarning = (index: number): SpecIssue => ({
  pointer: `/panels/${index}`,
  code: "legend-covers-data",
  message:
    "No place in the frame is free for the legend: it covers data. Make the panel larger or widen an axis.",
})

const insetWarning = (index: number): SpecIssue => ({
  pointer: `/panels/${index}/place`,
  code: "inset-covers-data",
  message: "This inset covers data of its panel. Move it, make it smaller, or widen an axis of the panel.",
})

/** Everything on the page of a figure: the panels of the grid, then the insets on paper of their own. */
export function figureBody({ grid, insets, marks, letters, typesetter }: BodyParts): {
  readonly svg: string
  readonly warnings: readonly SpecIssue[]
} {
  const warnings: SpecIssue[] = []
  const boxesIn = (host: LaidPanel) =>
    insets.flatMap((inset) => (inset.host === host.index ? [{ inset, box: boxInHost(inset, host) }] : []))
  const lettered = letterShapes(
    grid.map((panel) => ({
      letter: letters[panel.index]!,
      frame: panel.frame,
      ink: [...marks[panel.index]!.ink, ...boxesIn(panel).flatMap(({ box }) => boxPoints(box))],
      filled: panel.drawing.filled === true,
    })),
    typesetter.measure,
  )
  const legends = grid.map(({ drawing }) => JSON.stringify(drawing.legend))
  const panels = grid.map((panel, k) => {
    const { box: letterBox, shapes: letter } = lettered[k]!
    const boxes = boxesIn(panel)
    const { ink } = marks[panel.index]!
    for (const { inset } of boxes) {
      const covered = paperOf(inset, typesetter).some((box) => inkIn(ink, moved(box, panel.rect)) > 0)
      if (covered) warnings.push(insetWarning(inset.index))
    }
    const taken = [...(letterBox ? [letterBox] : []), ...boxes.map(({ box }) => box)]
    // A legend that says what one before it already said is left out.
    const legend = legends.indexOf(legends[k]!) === k
    const { svg, legendCoversData } = panelSvg(panel, marks[panel.index]!, typesetter, {
      legend,
      taken,
      letter,
    })
    if (legendCoversData) warnings.push(legendWarning(panel.index))
    return svg
  })
  const small = insets.map((inset) => {
    const d = paperOf(inset, typesetter).map(boxPath).join("")
    const paper = `<path d="${d}" fill="#ffffff"/>`
    const alone = { legend: true, taken: [], letter: [] }
    const { svg, legendCoversData } = panelSvg(inset, marks[inset.index]!, typesetter, alone)
    if (legendCoversData) warnings.push(legendWarning(inset.index))
    return paper + svg
  })
  return { svg: [...panels, ...small].join(""), warnings }
}
