import { written } from "@specs/chart/position"
import { findFace, openFont } from "./fonts"
import { scriptRuns } from "./set-label"

/** Receives the outline of glyphs; PDF, PostScript and SVG each write it their way. */
export interface OutlineSink {
  moveTo(x: number, y: number): void
  lineTo(x: number, y: number): void
  quadraticCurveTo(cx: number, cy: number, x: number, y: number): void
  bezierCurveTo(c1x: number, c1y: number, c2x: number, c2y: number, x: number, y: number): void
  closePath(): void
}

export interface OutlinedText {
  readonly text: string
  readonly x: number
  readonly y: number
  readonly family: string
  readonly sizePt: number
  readonly bold: boolean
  readonly italic: boolean
}

/** Traces a text's glyphs, kerned as its font says, with the baseline at (x, y) and y downwards. */
export function traceText(
  { text, x, y, family, sizePt, bold, italic }: OutlinedText,
  sink: OutlineSink,
): void {
  const face = findFace(family, bold, italic)
  if (!face) throw new Error(`“${family}” is not one of the figure fonts.`)
  const font = openFont(face)
  const scale = sizePt / font.unitsPerEm
  let pen = x
  for (const run of scriptRuns(text)) {
    const { glyphs, positions } = font.layout(run)
    glyphs.forEach((glyph, k) => {
      const { xAdvance, xOffset, yOffset } = positions[k]!
      const left = pen + xOffset * scale
      const base = y - yOffset * scale
      for (const { command, args } of glyph.path.commands) {
        const placed = args.map((value, index) =>
          index % 2 === 0 ? left + value * scale : base - value * scale,
        )
        sink[command](...(placed as [number, number, number, number, number, number]))
      }
      pen += xAdvance * scale
    })
  }
}

/** A text's outline as an SVG path. */
export function textPath(text: OutlinedText): string {
  let d = ""
  const put =
    (letter: string) =>
    (...values: number[]) => {
      d += letter + values.map(written).join(" ")
    }
  traceText(text, {
    moveTo: put("M"),
    lineTo: put("L"),
    quadraticCurveTo: put("Q"),
    bezierCurveTo: put("C"),
    closePath: put("Z"),
  })
  return d
}
