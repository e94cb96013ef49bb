import PDFDocument from "pdfkit"
import { readDrawing } from "../svg/read-drawing"
import { walkDrawing, type DrawingCanvas, type Paint, type Rgb, type Trace } from "../svg/walk-drawing"
import { findFace, fontBytes } from "../typeset/fonts"
import { advanceEm, scriptRuns } from "../typeset/set-label"

/** Dates are part of a PDF; a fixed one lets the same figure be the same bytes. */
const date = new Date(0)

const rgb = (color: Rgb): [number, number, number] => [...color]

function pdfCanvas(doc: PDFKit.PDFDocument): DrawingCanvas {
  const stroke = (paint: Paint) => {
    doc.lineWidth(paint.width).lineCap(paint.cap).lineJoin(paint.join).miterLimit(paint.miterLimit)
    // pdfkit's own dash() takes two lengths only.
    doc.addContent(`[${paint.dash.join(" ")}] 0 d`)
    doc.strokeColor(rgb(paint.stroke!))
  }
  return {
    save: () => void doc.save(),
    restore: () => void doc.restore(),
    transform: (matrix) => void doc.transform(...matrix),
    clip(trace) {
      trace(doc as unknown as Parameters<Trace>[0])
      doc.clip()
    },
    path(trace, paint) {
      const stroked = paint.stroke !== null && paint.width > 0
      if (!paint.fill && !stroked) return
      const { fillOpacity, strokeOpacity } = paint
      const transparent = (paint.fill && fillOpacity < 1) || (stroked && strokeOpacity < 1)
      if (transparent) doc.save().fillOpacity(fillOpacity).strokeOpacity(strokeOpacity)
      if (paint.fill) doc.fillColor(rgb(paint.fill))
      if (stroked) stroke(paint)
      trace(doc as unknown as Parameters<Trace>[0])
      if (paint.fill && stroked) doc.fillAndStroke()
      else if (paint.fill) doc.fill()
      else doc.stroke()
      if (transparent) doc.restore()
    },
    text({ text, x, y, family, sizePt, bold, italic }, paint) {
      if (!paint.fill) return
      const face = findFace(family, bold, italic)
      if (!face) throw new Error(`“${family}” is not one of the figure fonts.`)
      doc.registerFont(face.file, fontBytes(face))
      doc.font(face.file).fontSize(sizePt)
      doc.fillColor(rgb(paint.fill))
      let pen = x
      for (const run of scriptRuns(text)) {
        doc.text(run, pen, y, { lineBreak: false, baseline: "alphabetic" })
        pen += advanceEm(run, family, bold, italic) * sizePt
      }
    },
    image: ({ png, x, y, width, height }) => void doc.image(png, x, y, { width, height }),
  }
}

/**
 * A figure as PDF: one page of exactly its size, vectors, text as text in embedded subsets of the fonts, RGB.
 *
 * @param svg from renderFigure
 * @param options.title title in the document's properties; the figure's own without
 */
export function svgToPdf(svg: string, { title }: { readonly title?: string } = {}): Promise<Uint8Array> {
  const drawing = readDrawing(svg)
  const points = (mm: number) => (mm * 72) / 25.4
  const doc = new PDFDocument({
    size: [points(drawing.widthMm), points(drawing.heightMm)],
    margin: 0,
    pdfVersion: "1.5",
    lang: "en",
    displayTitle: true,
    info: {
      Title: title ?? drawing.title,
      Subject: drawing.description,
      Creator: "Afterquench",
      Producer: "Afterquench",
      CreationDate: date,
      ModDate: date,
    },
  })
  return new Promise((resolve, reject) => {
    const chunks: Buffer[] = []
    doc.on("data", (chunk: Buffer) => chunks.push(chunk))
    doc.on("end", () => resolve(Buffer.concat(chunks)))
    doc.on("error", reject)
    doc.scale(drawing.scale)
    try {
      walkDrawing(drawing.outer, pdfCanvas(doc))
      doc.end()
    } catch (error) {
      reject(error as Error)
    }
  })
}
