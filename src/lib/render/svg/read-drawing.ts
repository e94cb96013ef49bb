import { parseSvg, type SvgElement } from "./parse-svg"

/** A figure's outer <svg> and its size on paper. */
export interface Drawing {
  readonly outer: SvgElement
  readonly widthMm: number
  readonly heightMm: number
  /** Printed points for one user unit. */
  readonly scale: number
  readonly title: string
  readonly description: string
}

/** Reads a drawing made by renderFigure. */
export function readDrawing(svg: string): Drawing {
  const outer = parseSvg(svg).find(({ name }) => name === "svg")
  const millimetres = (key: string) => Number(/^([\d.]+)mm$/.exec(outer?.attributes[key] ?? "")?.[1])
  const [widthMm, heightMm] = [millimetres("width"), millimetres("height")]
  const viewWidth = Number(outer?.attributes["viewBox"]?.split(" ")[2])
  if (!outer || !(widthMm > 0) || !(heightMm > 0) || !(viewWidth > 0))
    throw new Error("This SVG does not state its size in millimetres and its view box.")
  const textOf = (name: string) => outer.children.find((child) => child.name === name)?.text ?? ""
  return {
    outer,
    widthMm,
    heightMm,
    scale: (widthMm * 72) / 25.4 / viewWidth,
    title: textOf("title"),
    description: textOf("desc"),
  }
}
