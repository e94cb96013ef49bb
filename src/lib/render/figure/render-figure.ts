import type { Legend, Look } from "@specs/chart/drawing"
import { defaultLook } from "@specs/chart/look"
import { patchLook, type LookPatch } from "@specs/chart/look-patch"
import type { PanelResult } from "@specs/figure-kind"
import type { FigureSpec } from "@specs/figure-spec"
import { kindOf as kindByName } from "@specs/kinds"
import type { SpecIssue } from "@specs/spec-error"
import { drawMarks, type DrawnMarks } from "../panel/draw-marks"
import { fontRules } from "../svg/embed-fonts"
import { typesetterFor } from "../typeset/typesetter"
import { checkLabels } from "./check-labels"
import { layOutGrid, layOutInsets, type Setting } from "./lay-out"
import { outerSvg } from "./outer-svg"
import { figureBody } from "./figure-body"
import { panelLetters } from "./panel-letters"
import { checkPlaces } from "./panel-places"

/** A figure at its printed size. */
export interface RenderedFigure {
  readonly svg: string
  readonly widthMm: number
  readonly heightMm: number
  readonly alternativeText: string
  /** What the caption must say about the drawing, one sentence each. */
  readonly notes: readonly string[]
  /** What was drawn but should be looked at, each with its place in the spec. */
  readonly warnings: readonly SpecIssue[]
  /** The legend of each panel in the order of the spec, for checks of what tells its series apart. */
  readonly legends: readonly Legend[]
}

export interface RenderOptions {
  /** Changes to the default look, such as a manuscript's house look. */
  readonly look?: LookPatch
  /** Where kinds come from; the registered ones unless a kind is being tried out. */
  readonly kindOf?: Setting["kindOf"]
}

/** The look of each panel: the figure's, changed by the panel's own style. The face is the figure's: one paper, one face. */
const panelLooks = (spec: FigureSpec, look: Look): readonly Look[] =>
  spec.panels.map(({ style }) => ({ ...patchLook(look, style), fontFamily: look.fontFamily }))

/**
 * Draws a figure at its exact size.
 *
 * @param spec a figure spec with defaults filled in
 * @param results one result a panel, in the order of the spec
 * @throws SpecError with every label and place that cannot be used
 * @see docs/rendering.md
 */
export async function renderFigure(
  spec: FigureSpec,
  results: readonly PanelResult[],
  { look: changes = {}, kindOf = kindByName }: RenderOptions = {},
): Promise<RenderedFigure> {
  const look = patchLook(defaultLook, changes)
  const typesetter = await typesetterFor(look.fontFamily)
  checkPlaces(spec)
  checkLabels(spec, typesetter)
  const setting = { spec, results, looks: panelLooks(spec, look), kindOf, measure: typesetter.measure }
  const grid = layOutGrid(setting)
  const insets = layOutInsets(setting, grid)
  const inOrder = [...grid, ...insets].sort((a, b) => a.index - b.index)
  const marks: DrawnMarks[] = []
  for (const { drawing, index } of inOrder) marks.push(await drawMarks(drawing.spec, `panel-${index + 1}-`))
  const letters = panelLetters(spec.panels, look)
  const { svg: body, warnings } = figureBody({ grid, insets, marks, letters, typesetter })
  const named = inOrder.map(({ index }) => {
    const inset = insets.find((one) => one.index === index)
    return [letters[inset ? inset.host : index], inset ? "Inset:" : ""].filter(Boolean).join(" ")
  })
  const prefixed = (index: number, text: string) => (named[index] ? `${named[index]} ${text}` : text)
  const alternativeText = inOrder
    .map(({ drawing }, index) => prefixed(index, drawing.alternativeText))
    .join(" ")
  const { widthMm, heightMm } = spec.size
  return {
    svg: outerSvg({
      widthMm,
      heightMm,
      title: spec.title || "Figure",
      description: alternativeText,
      body,
      style: await fontRules(body),
    }),
    widthMm,
    heightMm,
    alternativeText,
    notes: inOrder.flatMap(({ drawing }, index) => drawing.notes.map((note) => prefixed(index, note))),
    warnings,
    legends: inOrder.map(({ drawing }) => drawing.legend),
  }
}
