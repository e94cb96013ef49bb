import type { TextPlace } from "./drawing"

/** Size of a set label in em of its type size. */
export interface LabelSize {
  readonly widthEm: number
  readonly heightEm: number
  readonly depthEm: number
}
/** Measures a label as it will be set; the server asks the font files, the browser its canvas. */
export type MeasureLabel = (text: string, bold: boolean) => LabelSize

export interface PathShape {
  readonly type: "path"
  readonly d: string
  readonly fill: string | null
  readonly stroke: string | null
  readonly widthPt: number
  readonly dash?: readonly number[]
}

export interface TextShape extends TextPlace {
  readonly type: "text"
  readonly text: string
  readonly fontPt: number
  readonly color: string
  readonly bold: boolean
}

export interface ImageShape {
  readonly type: "image"
  /** data:image/png;base64 */
  readonly href: string
  readonly x: number
  readonly y: number
  readonly width: number
  readonly height: number
}

/** What the layout draws around and into a frame, in points, y downwards. */
export type Shape = PathShape | TextShape | ImageShape

export interface Box {
  readonly left: number
  readonly top: number
  readonly right: number
  readonly bottom: number
}

/** Half the height of figures and capitals: a label centred on a tick has its digits centred. */
const middleEm = 0.345

/** Where the baseline of a text starts, before its rotation, relative to the point that it hangs on. */
export function baselineOffset(
  { align, baseline, fontPt }: Pick<TextShape, "align" | "baseline" | "fontPt">,
  size: LabelSize,
): { readonly dx: number; readonly dy: number } {
  const width = size.widthEm * fontPt
  const dx = align === "center" ? -width / 2 : align === "right" ? -width : 0
  const rise = { top: size.heightEm, middle: middleEm, alphabetic: 0, bottom: -size.depthEm }[baseline]
  return { dx, dy: rise * fontPt }
}

/** The four corners of a text's box after its rotation. */
export function textCorners(text: TextShape, size: LabelSize): readonly (readonly [number, number])[] {
  const { dx, dy } = baselineOffset(text, size)
  const top = dy - size.heightEm * text.fontPt
  const bottom = dy + size.depthEm * text.fontPt
  const right = dx + size.widthEm * text.fontPt
  const turn = (text.angle * Math.PI) / 180
  const [cos, sin] = [Math.cos(turn), Math.sin(turn)]
  return (
    [
      [dx, top],
      [right, top],
      [right, bottom],
      [dx, bottom],
    ] as const
  ).map(([x, y]) => [text.x + x * cos - y * sin, text.y + x * sin + y * cos])
}

export function boundsOf(points: readonly (readonly [number, number])[]): Box {
  const xs = points.map(([x]) => x)
  const ys = points.map(([, y]) => y)
  return { left: Math.min(...xs), top: Math.min(...ys), right: Math.max(...xs), bottom: Math.max(...ys) }
}

/** The smallest box around all of some shapes' texts. */
export function textBounds(shapes: readonly Shape[], measure: MeasureLabel): Box | null {
  const corners = shapes.flatMap((shape) =>
    shape.type === "text" ? textCorners(shape, measure(shape.text, shape.bold)) : [],
  )
  return corners.length === 0 ? null : boundsOf(corners)
}
