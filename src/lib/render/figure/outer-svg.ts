import { written } from "@specs/chart/position"
import { escapeXml } from "../svg/parse-svg"

export const pointsPerMm = 72 / 25.4

/** The document around a figure: its size in millimetres, one user unit a point, white paper, title and description. */
export function outerSvg(parts: {
  readonly widthMm: number
  readonly heightMm: number
  readonly title: string
  readonly description: string
  readonly body: string
  readonly style?: string
}): string {
  const [w, h] = [written(parts.widthMm * pointsPerMm), written(parts.heightMm * pointsPerMm)]
  const spaces = 'xmlns="http://www.w3.org/2000/svg" xmlns:xlink="http://www.w3.org/1999/xlink"'
  const size = `width="${parts.widthMm}mm" height="${parts.heightMm}mm" viewBox="0 0 ${w} ${h}"`
  const named = 'role="img" aria-labelledby="figure-title figure-description"'
  return [
    `<?xml version="1.0" encoding="UTF-8"?>\n<svg ${spaces} version="1.1" ${size} ${named}>`,
    `<title id="figure-title">${escapeXml(parts.title)}</title>`,
    `<desc id="figure-description">${escapeXml(parts.description)}</desc>`,
    parts.style ? `<style>${parts.style}</style>` : "",
    `<rect width="${w}" height="${h}" fill="#ffffff"/>`,
    parts.body,
    "</svg>\n",
  ].join("")
}
