import * as vega from "vega"
import { channelsOf } from "@specs/chart/tint"
import type { OutlinedText, OutlineSink } from "../typeset/glyph-outlines"
import { compose, identity, parseTransform, type Matrix } from "./matrix"
import { readText } from "./outline-text"
import type { SvgElement } from "./parse-svg"

export type Rgb = readonly [number, number, number]

/** How a shape is painted; a null colour is no paint. */
export interface Paint {
  readonly fill: Rgb | null
  readonly fillOpacity: number
  readonly stroke: Rgb | null
  readonly strokeOpacity: number
  readonly width: number
  readonly cap: "butt" | "round" | "square"
  readonly join: "miter" | "round" | "bevel"
  readonly miterLimit: number
  readonly dash: readonly number[]
}

export type Trace = (sink: OutlineSink) => void

export interface PlacedImage {
  readonly png: Buffer
  readonly x: number
  readonly y: number
  readonly width: number
  readonly height: number
}

/** What a format offers to be drawn with. State is saved before and restored after every group that changes it. */
export interface DrawingCanvas {
  save(): void
  restore(): void
  transform(matrix: Matrix): void
  clip(trace: Trace): void
  path(trace: Trace, paint: Paint): void
  text(text: OutlinedText, paint: Paint): void
  image(image: PlacedImage): void
}

/** Properties that a shape takes from the groups around it. */
const inherited = [
  "fill",
  "stroke",
  "fill-opacity",
  "stroke-opacity",
  "stroke-width",
  "stroke-linecap",
  "stroke-linejoin",
  "stroke-miterlimit",
  "stroke-dasharray",
] as const
type Style = Partial<Record<(typeof inherited)[number], string>>

const color = (value: string | undefined): Rgb | null =>
  value === undefined || value === "none" ? null : channelsOf(value)

function paintOf(style: Style): Paint {
  const dash = style["stroke-dasharray"]
  return {
    fill: color(style.fill),
    fillOpacity: Number(style["fill-opacity"] ?? 1),
    stroke: color(style.stroke),
    strokeOpacity: Number(style["stroke-opacity"] ?? 1),
    width: Number(style["stroke-width"] ?? 1),
    cap: (style["stroke-linecap"] ?? "butt") as Paint["cap"],
    join: (style["stroke-linejoin"] ?? "miter") as Paint["join"],
    miterLimit: Number(style["stroke-miterlimit"] ?? 4),
    dash: dash && dash !== "none" ? dash.split(/[\s,]+/).map(Number) : [],
  }
}

const { pathParse, pathRender } = vega as unknown as {
  pathParse(path: string): unknown
  pathRender(sink: OutlineSink, path: unknown, x: number, y: number): void
}

export const tracePath =
  (d: string): Trace =>
  (sink) =>
    pathRender(sink, pathParse(d), 0, 0)

const number = (element: SvgElement, name: string): number => Number(element.attributes[name] ?? 0)

function traceRect(element: SvgElement): Trace {
  const [x, y] = [number(element, "x"), number(element, "y")]
  const [right, bottom] = [x + number(element, "width"), y + number(element, "height")]
  return (sink) => {
    sink.moveTo(x, y)
    sink.lineTo(right, y)
    sink.lineTo(right, bottom)
    sink.lineTo(x, bottom)
    sink.closePath()
  }
}

/** Outline of a shape, or null where an element is none. */
export function traceOf(element: SvgElement): Trace | null {
  if (element.name === "rect") return traceRect(element)
  if (element.name === "path") return tracePath(element.attributes["d"] ?? "")
  if (element.name === "line")
    return (sink) => {
      sink.moveTo(number(element, "x1"), number(element, "y1"))
      sink.lineTo(number(element, "x2"), number(element, "y2"))
    }
  return null
}

export function readImage(element: SvgElement): PlacedImage {
  const href = element.attributes["xlink:href"] ?? element.attributes["href"] ?? ""
  const [, data] = /^data:image\/png;base64,(.+)$/.exec(href) ?? []
  if (!data) throw new Error("SVG: an image is not PNG data.")
  const place = { x: number(element, "x"), y: number(element, "y") }
  const size = { width: number(element, "width"), height: number(element, "height") }
  return { png: Buffer.from(data, "base64"), ...place, ...size }
}

/** The map of an <svg> inside a drawing: its view box fitted and centred into its place. */
function nestedMatrix(element: SvgElement): Matrix {
  const box = (element.attributes["viewBox"] ?? "").split(/[\s,]+/).map(Number)
  const [width, height] = [number(element, "width"), number(element, "height")]
  const [left = 0, top = 0, boxWidth = width, boxHeight = height] = box.length === 4 ? box : []
  const scale = Math.min(width / boxWidth, height / boxHeight)
  const x = number(element, "x") + (width - scale * boxWidth) / 2 - scale * left
  const y = number(element, "y") + (height - scale * boxHeight) / 2 - scale * top
  return [scale, 0, 0, scale, x, y]
}

const silent = new Set(["title", "desc", "style", "defs", "clipPath"])

function clipPaths(elements: readonly SvgElement[], found = new Map<string, SvgElement>()) {
  for (const element of elements) {
    if (element.name === "clipPath") found.set(element.attributes["id"] ?? "", element)
    clipPaths(element.children, found)
  }
  return found
}

/**
 * Draws the children of a figure's outer <svg> on a canvas. Strict: an element, colour or transform that our drawings do
 * not contain is an error, so that no format silently shows less than the SVG.
 */
export function walkDrawing(outer: SvgElement, canvas: DrawingCanvas): void {
  const clips = clipPaths(outer.children)

  function clipTo(reference: string): void {
    const id = /^url\(#([^)]+)\)$/.exec(reference)?.[1] ?? ""
    const shape = clips.get(id)?.children[0]
    const trace = shape ? traceOf(shape) : null
    if (!trace) throw new Error(`SVG: the clip ${reference} is not defined.`)
    canvas.clip(trace)
  }

  function visit(element: SvgElement, around: Style): void {
    const { name, attributes } = element
    if (silent.has(name) || attributes["display"] === "none") return
    if (attributes["opacity"] !== undefined) throw new Error("SVG: group opacity is not used in figures.")
    const style: Style = { ...around }
    for (const key of inherited) if (attributes[key] !== undefined) style[key] = attributes[key]
    const nested = name === "svg"
    const matrix = compose(parseTransform(attributes["transform"]), nested ? nestedMatrix(element) : identity)
    const clip = attributes["clip-path"]
    const own = clip !== undefined || matrix.some((value, k) => value !== identity[k])
    if (own) canvas.save()
    if (nested) canvas.clip(traceRect(element))
    if (own) canvas.transform(matrix)
    if (clip !== undefined) clipTo(clip)
    const trace = traceOf(element)
    if (trace) canvas.path(trace, paintOf(name === "line" ? { ...style, fill: "none" } : style))
    else if (name === "text") canvas.text(readText(element), paintOf(style))
    else if (name === "image") canvas.image(readImage(element))
    else if (name === "g" || nested) for (const child of element.children) visit(child, style)
    else throw new Error(`SVG: <${name}> is not an element that figures use.`)
    if (own) canvas.restore()
  }

  for (const child of outer.children) visit(child, { fill: "#000000", stroke: "none" })
}
