import { deflateSync } from "node:zlib"
import sharp from "sharp"
import type { SvgElement } from "../svg/parse-svg"
import { readDrawing } from "../svg/read-drawing"
import {
  readImage,
  walkDrawing,
  type DrawingCanvas,
  type Paint,
  type Rgb,
  type Trace,
} from "../svg/walk-drawing"
import { traceText } from "../typeset/glyph-outlines"
import { ascii85 } from "./ascii85"

function written(value: number): string {
  const rounded = Math.round(value * 1e4) / 1e4
  return `${rounded === 0 ? 0 : rounded}`
}
const list = (values: readonly number[]): string => values.map(written).join(" ")

const ascii = (text: string): string => text.replace(/[^\x20-\x7e]/g, "?").slice(0, 200)

/** PostScript knows no transparency: a colour is mixed with the white of the paper. */
const flattened = (color: Rgb, opacity: number): string =>
  `${list(color.map((channel) => (255 - (255 - channel) * opacity) / 255))} rg`

interface PostScriptImage {
  readonly width: number
  readonly height: number
  readonly channels: number
  readonly data: string
}

/** All images of a drawing, decoded beforehand because walking is synchronous. */
async function decodeImages(element: SvgElement, found = new Map<string, PostScriptImage>()) {
  if (element.name === "image") {
    const { png } = readImage(element)
    const { data, info } = await sharp(png)
      .flatten({ background: "#ffffff" })
      .toColourspace("srgb")
      .raw()
      .toBuffer({ resolveWithObject: true })
    const { width, height, channels } = info
    found.set(png.toString("base64"), {
      width,
      height,
      channels,
      data: ascii85(deflateSync(data, { level: 9 })),
    })
  }
  for (const child of element.children) await decodeImages(child, found)
  return found
}

function imageProgram({ width, height, channels, data }: PostScriptImage): string {
  const space = channels === 1 ? "/DeviceGray" : "/DeviceRGB"
  const decode = Array.from({ length: channels }, () => "0 1").join(" ")
  return [
    `${space} setcolorspace << /ImageType 1 /Width ${width} /Height ${height} /BitsPerComponent 8`,
    `/Decode [${decode}] /ImageMatrix [${width} 0 0 ${height} 0 0] /Interpolate false`,
    "/DataSource currentfile /ASCII85Decode filter /FlateDecode filter >> image",
    data,
  ].join("\n")
}

function postScriptCanvas(out: string[], images: ReadonlyMap<string, PostScriptImage>): DrawingCanvas {
  let at = { x: 0, y: 0 }
  const go = (x: number, y: number, command: string) => {
    at = { x, y }
    out.push(command)
  }
  const sink: Parameters<Trace>[0] = {
    moveTo: (x, y) => go(x, y, `${list([x, y])} m`),
    lineTo: (x, y) => go(x, y, `${list([x, y])} l`),
    bezierCurveTo: (ax, ay, bx, by, x, y) => go(x, y, `${list([ax, ay, bx, by, x, y])} c`),
    // A quadratic curve as the cubic one that it is.
    quadraticCurveTo(cx, cy, x, y) {
      const third = (from: number, control: number) => from + (2 / 3) * (control - from)
      this.bezierCurveTo(third(at.x, cx), third(at.y, cy), third(x, cx), third(y, cy), x, y)
    },
    closePath: () => out.push("h"),
  }
  const caps = { butt: 0, round: 1, square: 2 }
  const joins = { miter: 0, round: 1, bevel: 2 }
  const fill = (paint: Paint) => {
    if (paint.fill) out.push(`${flattened(paint.fill, paint.fillOpacity)} fill`)
  }
  return {
    save: () => void out.push("q"),
    restore: () => void out.push("Q"),
    transform: (matrix) => void out.push(`[${list(matrix)}] concat`),
    clip(trace) {
      trace(sink)
      out.push("clip n")
    },
    path(trace, paint) {
      if (paint.fill) {
        trace(sink)
        fill(paint)
      }
      if (!paint.stroke || paint.width === 0) return
      trace(sink)
      const line = `${written(paint.width)} setlinewidth ${caps[paint.cap]} setlinecap ${joins[paint.join]} setlinejoin`
      const dash = `${written(paint.miterLimit)} setmiterlimit [${list(paint.dash)}] 0 setdash`
      out.push(`${flattened(paint.stroke, paint.strokeOpacity)} ${line} ${dash} stroke`)
    },
    text(text, paint) {
      out.push(`% ${ascii(text.text)}`)
      traceText(text, sink)
      fill(paint)
    },
    image({ png, x, y, width, height }) {
      const image = images.get(png.toString("base64"))!
      out.push(`q [${list([width, 0, 0, height, x, y])}] concat`, imageProgram(image), "Q")
    },
  }
}

/**
 * A figure as Encapsulated PostScript, level 3: vectors, text as outlines so that no font is asked for, transparency
 * mixed with white.
 *
 * @param svg from renderFigure
 */
export async function svgToEps(svg: string): Promise<Uint8Array> {
  const drawing = readDrawing(svg)
  const images = await decodeImages(drawing.outer)
  const [width, height] = [drawing.widthMm, drawing.heightMm].map((mm) => (mm * 72) / 25.4) as [
    number,
    number,
  ]
  const body: string[] = []
  walkDrawing(drawing.outer, postScriptCanvas(body, images))
  const program = [
    "%!PS-Adobe-3.0 EPSF-3.0",
    `%%Title: ${ascii(drawing.title)}`,
    "%%Creator: Afterquench",
    "%%LanguageLevel: 3",
    "%%DocumentData: Clean7Bit",
    `%%BoundingBox: 0 0 ${Math.ceil(width)} ${Math.ceil(height)}`,
    `%%HiResBoundingBox: 0 0 ${written(width)} ${written(height)}`,
    "%%EndComments",
    "/figure 20 dict def figure begin",
    "/m {moveto} bind def /l {lineto} bind def /c {curveto} bind def /h {closepath} bind def",
    "/q {gsave} bind def /Q {grestore} bind def /n {newpath} bind def /rg {setrgbcolor} bind def",
    `q 0 ${written(height)} translate ${list([drawing.scale, -drawing.scale])} scale n`,
    ...body,
    "Q end",
    "showpage",
    "%%EOF",
    "",
  ]
  return Buffer.from(program.join("\n"), "latin1")
}
