import { useCallback, useEffect, useMemo, useRef, useState } from "react"
import { VegaEmbed } from "react-vega"
import type { Spec, View } from "vega"
import type { EmbedOptions, Result } from "vega-embed"
import { expressionInterpreter } from "vega-interpreter"
import { annotationShapes } from "@specs/chart/annotation-shapes"
import type { Frame, Look, PanelDrawing } from "@specs/chart/drawing"
import { fitFrame, type FittedPanel } from "@specs/chart/fit-frame"
import type { Ink } from "@specs/chart/free-place"
import { insideShapes } from "@specs/chart/inside-shapes"
import { sceneInk, type SceneMark } from "@specs/chart/scene-ink"
import type { Shape } from "@specs/chart/shape"
import { frameShapes } from "@specs/chart/surroundings"
import { useFigureFont } from "./figure-fonts"
import { labelSetter, type MathBox } from "./set-runs"
import { ShapeView } from "./shape-view"
import { splitData } from "./split-data"
import { useMathBoxes, type Typeset } from "./use-math-boxes"

/** Where the data rectangle of a working view is, in pixels of its box, and what its abscissas are there. */
export interface ChartPlace {
  readonly view: View
  readonly left: number
  readonly top: number
  readonly width: number
  readonly height: number
  readonly toPx: (value: number) => number
  readonly fromPx: (px: number) => number
}

interface ChartProps {
  /** The kind's `build` for the present result; keep its identity while the result stands. */
  readonly draw: (frame: Frame) => PanelDrawing
  /** Sizes in pixels: scaleLook(look, 96 / 72 * zoom). */
  readonly look: Look
  readonly width: number
  readonly height: number
  readonly typeset: Typeset
  /** Told once a view is there and after every change of its size or data. */
  readonly onReady?: (place: ChartPlace) => void
}

/** No script is made from strings: Vega's expressions are interpreted, as the content policy demands. */
const options: EmbedOptions = {
  mode: "vega",
  ast: true,
  expr: expressionInterpreter,
  renderer: "svg",
  actions: false,
  hover: false,
  tooltip: false,
  defaultStyle: false,
}

/** Free space at the rim, in pixels. */
const edge = 2
/** Legend and labels look for a new place only when the data have been still for so long, in milliseconds. */
const settleMs = 200

type Scale = ((value: number) => number) & { readonly invert: (px: number) => number }

/**
 * Embeds a view for the shape of a drawing, hands it the rows and reports where its frame is.
 *
 * @returns what VegaEmbed needs, and where the ink is once that has settled
 */
function useLivingView({ drawing, frame, margins }: FittedPanel, onReady: ChartProps["onReady"]) {
  const { template: shape, tables } = useMemo(() => splitData(drawing), [drawing])
  // Equal shapes are one object, so that a view can be told to belong to the present one.
  const key = JSON.stringify(shape)
  const template = useMemo(() => JSON.parse(key) as Spec, [key])
  const [living, setLiving] = useState<{ readonly view: View; readonly template: Spec } | null>(null)
  const embedded = useCallback((result: Result) => setLiving({ view: result.view, template }), [template])
  const view = living?.template === template ? living.view : null
  const [ink, setInk] = useState<Ink>([])
  const report = useRef(onReady)
  useEffect(() => {
    report.current = onReady
  }, [onReady])
  const [left, top] = [margins.left + edge, margins.top + edge]
  const { widthPt: width, heightPt: height } = frame
  useEffect(() => {
    if (!view) return
    let settle: ReturnType<typeof setTimeout> | undefined
    let current = true
    for (const [name, rows] of tables) view.data(name, [...rows])
    void view.runAsync().then(() => {
      if (!current) return
      const scale = view.scale("x") as Scale
      const toPx = (value: number) => left + scale(value)
      const fromPx = (px: number) => scale.invert(px - left)
      report.current?.({ view, left, top, width, height, toPx, fromPx })
      const { root } = view.scenegraph() as unknown as { readonly root: SceneMark }
      settle = setTimeout(() => setInk(sceneInk(root)), settleMs)
    })
    return () => {
      current = false
      clearTimeout(settle)
    }
  }, [view, tables, left, top, width, height])
  return { template, embedded, ink }
}

function SetChart({
  draw,
  look,
  width,
  height,
  boxes,
  want,
  onReady,
}: Omit<ChartProps, "typeset"> & {
  readonly boxes: ReadonlyMap<string, MathBox>
  readonly want: (tex: readonly string[]) => void
}) {
  const { set, missing } = useMemo(() => labelSetter(boxes, look.fontFamily), [boxes, look.fontFamily])
  const panel = useMemo(
    () => fitFrame(draw, look, { width, height }, set, edge),
    [draw, look, width, height, set],
  )
  const { drawing, frame, margins, texts } = panel
  const { template, embedded, ink } = useLivingView(panel, onReady)
  const { under } = useMemo(
    () => annotationShapes(drawing.annotations ?? [], drawing, frame),
    [drawing, frame],
  )
  const shapes = useMemo(
    () => [
      ...frameShapes(drawing, frame),
      ...texts,
      ...insideShapes(drawing, frame, ink, set, { legend: true, taken: [] }).shapes,
    ],
    [drawing, frame, texts, ink, set],
  )
  useEffect(() => {
    const tex = missing()
    if (tex.length > 0) want(tex)
  }, [shapes, missing, want])
  const [left, top] = [margins.left + edge, margins.top + edge]
  const layer = (layerShapes: readonly Shape[]) => (
    <svg className="pointer-events-none absolute inset-0" width={width} height={height} aria-hidden="true">
      <g transform={`translate(${left},${top})`}>
        {layerShapes.map((shape, index) => (
          <ShapeView key={index} shape={shape} set={set} family={look.fontFamily} />
        ))}
      </g>
    </svg>
  )
  return (
    <div className="relative" style={{ width, height }} role="img" aria-label={drawing.alternativeText}>
      {under.length > 0 && layer(under)}
      <div className="absolute" style={{ left, top }} aria-hidden="true">
        <VegaEmbed spec={template} options={options} onEmbed={embedded} />
      </div>
      {layer(shapes)}
    </div>
  )
}

/**
 * The interactive plot of one panel. Vega draws the data; frame, axes, labels and legend are set over it by the same
 * layout as in the proof. New rows are handed to the living view; only a new shape of drawing embeds again.
 */
export function WorkingChart({ typeset, ...props }: ChartProps) {
  const loaded = useFigureFont(props.look.fontFamily)
  const { boxes, want } = useMathBoxes(typeset)
  if (!loaded) return <div style={{ width: props.width, height: props.height }} aria-busy="true" />
  return <SetChart {...props} boxes={boxes} want={want} />
}
