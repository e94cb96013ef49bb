import subsetFont from "subset-font"
import { faces, fontBytes } from "../typeset/fonts"
import { readText } from "./outline-text"
import { parseSvg, type SvgElement } from "./parse-svg"

/** Characters that each face of a drawing shows, by the face's place in `faces`. */
function charactersByFace(elements: readonly SvgElement[], found = new Map<number, Set<string>>()) {
  for (const element of elements) {
    if (element.name === "text") {
      const { family, bold, italic, text } = readText(element)
      const cuts = faces.map((face, index) => ({ face, index })).filter(({ face }) => face.family === family)
      const cut =
        cuts.find(({ face }) => face.weight === (bold ? 700 : 400) && face.italic === italic) ?? cuts[0]
      if (!cut) throw new Error(`“${family}” is not one of the figure fonts.`)
      const known = found.get(cut.index) ?? new Set()
      for (const character of text) known.add(character)
      found.set(cut.index, known)
    }
    charactersByFace(element.children, found)
  }
  return found
}

const remembered = 200
const known = new Map<string, string>()

/** The rule that carries a face cut down to some characters; remembered, for a page of figures shows the same few. */
async function fontRule(index: number, characters: string): Promise<string> {
  const key = `${index} ${characters}`
  const hit = known.get(key)
  if (hit !== undefined) return hit
  const face = faces[index]!
  const subset = await subsetFont(fontBytes(face), characters, { targetFormat: "woff2" })
  const source = `url(data:font/woff2;base64,${subset.toString("base64")}) format("woff2")`
  const style = face.italic ? "italic" : "normal"
  const rule = `@font-face{font-family:"${face.family}";font-weight:${face.weight};font-style:${style};src:${source}}`
  if (known.size >= remembered) known.clear()
  known.set(key, rule)
  return rule
}

/**
 * The style rules that carry the fonts of a drawing, each cut down to the characters that it shows, so that the SVG
 * looks the same wherever it is opened. Subsetting is deterministic: sorted characters give the same bytes.
 */
export async function fontRules(body: string): Promise<string> {
  const used = [...charactersByFace(parseSvg(body))].sort(([a], [b]) => a - b)
  const rules = await Promise.all(
    used.map(([index, characters]) => fontRule(index, [...characters].sort().join(""))),
  )
  return rules.join("")
}
