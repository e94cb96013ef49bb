import { frameShapes } from "@specs/chart/surroundings"
import { annotationShapes } from "@specs/chart/annotation-shapes"
import type { Legend, Look } from "@specs/chart/drawing"
import { insideShapes } from "@specs/chart/inside-shapes"
import { defaultLook } from "@specs/chart/look"
import { patchLook, readLookPatch, type LookPatch } from "@specs/chart/look-patch"
import type { PanelResult } from "@specs/figure-kind"
import type { FigureSpec } from "@specs/figure-spec"
import { kindOf as kindByName, type AnyKind } from "@specs/kinds"
import type { PanelParams } from "@specs/registry"
import { SpecError } from "@specs/spec-error"
import { drawMarks, type DrawnMarks } from "../panel/draw-marks"
import { fontRules } from "../svg/embed-fonts"
import { typesetterFor } from "../typeset/typesetter"
import { checkLabels } from "./check-labels"
import { checkPlaces } from "./check-places"
import { layOut } from "./lay-out"
import { outerSvg } from "./outer-svg"
import { letterShapes, panelLetters } from "./panel-letters"
import { movedSvg, shapesSvg } from "./shape-svg"

/** A figure at its printed size. */
export interface RenderedFigure {
  readonly svg: string
  readonly widthMm: number
  readonly heightMm: number
  readonly alternativeText: string
  /** What the caption must say about the drawing, one sentence each. */
  readonly notes: readonly string[]
  /** The legend of each panel, for checks of what tells its series apart. */
  readonly legends: readonly Legend[]
}

export interface RenderOptions {
  /** Changes to the default look, such as a manuscript's house look. */
  readonly look?: LookPatch
  /** Where kinds come from; the registered ones unless a kind is being tried out. */
  readonly kindOf?: (kind: PanelParams["kind"]) => Pick<AnyKind, "build">
}

/** The look of each panel: the figure's, changed by the panel's own style. The face is the figure's: one paper, one face. */
function panelLooks(spec: FigureSpec, look: Look): readonly Look[] {
  const read = spec.panels.map(({ style }, index) => readLookPatch(style, `/panels/${index}/style`))
  const issues = read.flatMap((one) => one.issues)
  if (issues.length > 0) throw new SpecError(issues)
  return read.map(({ patch }) => ({ ...patchLook(look, patch), fontFamily: look.fontFamily }))
}

/** Whether a legend says what one before it already said. */
function repeated(legends: readonly { readonly entries: readonly unknown[] }[], index: number): boolean {
  const own = JSON.stringify(legends[index])
  return legends.slice(0, index).some((legend) => JSON.stringify(legend) === own)
}

/**
 * Draws a figure at its exact size.
 *
 * @param spec a figure spec with defaults filled in
 * @param results one result a panel, in the order of the spec
 * @throws SpecError with every label, place or style setting that cannot be used
 * @see docs/rendering.md
 */
export async function renderFigure(
  spec: FigureSpec,
  results: readonly PanelResult[],
  { look: changes = {}, kindOf = kindByName }: RenderOptions = {},
): Promise<RenderedFigure> {
  const look = patchLook(defaultLook, changes)
  const typesetter = await typesetterFor(look.fontFamily)
  const { measure } = typesetter
  checkPlaces(spec)
  checkLabels(spec, typesetter)
  const panels = layOut({ spec, results, looks: panelLooks(spec, look), kindOf, measure })
  const marks: DrawnMarks[] = []
  for (const [index, { drawing }] of panels.entries())
    marks.push(await drawMarks(drawing.spec, `panel-${index + 1}-`))
  const letters = panelLetters(spec.panels, look)
  const lettered = letterShapes(
    panels.map(({ drawing, frame }, index) => ({
      letter: letters[index]!,
      frame,
      ink: marks[index]!.ink,
      filled: drawing.colorBar !== null,
    })),
    measure,
  )
  const legends = panels.map(({ drawing }) => drawing.legend)
  const body = panels
    .map(({ drawing, rect, frame, texts }, index) => {
      const { svg, ink } = marks[index]!
      const letter = lettered[index]!
      const inside = insideShapes(drawing, frame, ink, measure, {
        legend: !repeated(legends, index),
        taken: letter.box ? [letter.box] : [],
      })
      const { under } = annotationShapes(drawing.annotations ?? [], drawing, frame)
      const shapes = [...frameShapes(drawing, frame), ...texts, ...letter.shapes, ...inside]
      return movedSvg(rect.x, rect.y, shapesSvg(under, typesetter) + svg + shapesSvg(shapes, typesetter))
    })
    .join("")
  const described = panels.map(({ drawing }, index) =>
    letters[index] ? `${letters[index]} ${drawing.alternativeText}` : drawing.alternativeText,
  )
  const alternativeText = described.join(" ")
  const { widthMm, heightMm } = spec.size
  const svg = outerSvg({
    widthMm,
    heightMm,
    title: spec.title || "Figure",
    description: alternativeText,
    body,
    style: await fontRules(body),
  })
  const notes = panels.flatMap(({ drawing }, index) =>
    drawing.notes.map((note) => (letters[index] ? `${letters[index]} ${note}` : note)),
  )
  return { svg, widthMm, heightMm, alternativeText, notes, legends }
}
