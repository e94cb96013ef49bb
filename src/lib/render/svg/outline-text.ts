import { textPath } from "../typeset/glyph-outlines"
import { parseSvg, writeSvg, type SvgElement } from "./parse-svg"

/** What a <text> element of our own drawings says, in numbers. */
export function readText({ attributes, text }: SvgElement) {
  return {
    text,
    x: Number(attributes["x"] ?? 0),
    y: Number(attributes["y"] ?? 0),
    family: (attributes["font-family"] ?? "").split(",")[0]!,
    sizePt: Number(attributes["font-size"]),
    bold: attributes["font-weight"] === "700",
    italic: attributes["font-style"] === "italic",
  }
}

function outlined(element: SvgElement): SvgElement | null {
  if (element.name === "style") return null
  if (element.name === "text")
    return { name: "path", attributes: { d: textPath(readText(element)) }, children: [], text: "" }
  return { ...element, children: element.children.flatMap((child) => outlined(child) ?? []) }
}

/**
 * The same drawing with its text as outlines, for renderers that would otherwise look for fonts on their machine: what
 * they draw then depends on our font files alone.
 */
export function outlineText(svg: string): string {
  return writeSvg(parseSvg(svg).flatMap((element) => outlined(element) ?? []))
}
