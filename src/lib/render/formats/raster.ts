import sharp from "sharp"
import { outlineText } from "../svg/outline-text"

/** Largest picture that is drawn, in pixels: 400 mm x 300 mm at 1200 dpi. */
const mostPixels = 3e8

const size = /width="([\d.]+)mm" height="([\d.]+)mm"/

/** A figure rastered on white at exactly its size: 86 mm at 600 dpi are 2031 pixels. */
function rastered(svg: string, dpi: number) {
  const [whole, widthMm, heightMm] = size.exec(svg) ?? []
  if (!whole) throw new Error("This SVG does not state its size in millimetres.")
  const pixels = (mm: string | undefined) => Math.round((Number(mm) / 25.4) * dpi)
  const sized = outlineText(svg.replace(size, `width="${pixels(widthMm)}" height="${pixels(heightMm)}"`))
  return sharp(Buffer.from(sized), { density: 72, limitInputPixels: mostPixels }).flatten({
    background: "#ffffff",
  })
}

/**
 * A figure as PNG.
 *
 * @param svg from renderFigure
 * @param dpi pixels an inch, written into the file so that it prints at its size
 */
export async function svgToPng(svg: string, { dpi }: { readonly dpi: number }): Promise<Uint8Array> {
  return rastered(svg, dpi).withMetadata({ density: dpi }).png({ compressionLevel: 6 }).toBuffer()
}

/** A figure as TIFF, compressed without loss (LZW), with its resolution. @see svgToPng for the parameters */
export async function svgToTiff(svg: string, { dpi }: { readonly dpi: number }): Promise<Uint8Array> {
  const resolution = { resolutionUnit: "inch", xres: dpi / 25.4, yres: dpi / 25.4 } as const
  return rastered(svg, dpi)
    .tiff({ compression: "lzw", predictor: "horizontal", ...resolution })
    .toBuffer()
}
