/** One element of a drawing. `text` is the character data directly inside it. */
export interface SvgElement {
  readonly name: string
  readonly attributes: Readonly<Record<string, string>>
  readonly children: readonly SvgElement[]
  readonly text: string
}

interface OpenElement extends SvgElement {
  readonly children: OpenElement[]
  text: string
}

const named: Record<string, string> = { lt: "<", gt: ">", quot: '"', apos: "'", amp: "&" }

function decode(text: string): string {
  return text.replace(/&(?:#x([0-9a-f]+)|#(\d+)|(\w+));/gi, (whole, hex, decimal, name) => {
    if (hex) return String.fromCodePoint(parseInt(hex as string, 16))
    if (decimal) return String.fromCodePoint(Number(decimal))
    return named[name as string] ?? whole
  })
}

export function escapeXml(text: string): string {
  return text.replace(/&/g, "&amp;").replace(/</g, "&lt;").replace(/>/g, "&gt;").replace(/"/g, "&quot;")
}

const token = /<\?[^>]*\?>|<!--[\s\S]*?-->|<(\/?)([\w:-]+)((?:\s+[\w:-]+="[^"]*")*)\s*(\/?)>|([^<]+)/g
const attribute = /([\w:-]+)="([^"]*)"/g

/**
 * Reads the XML that this project's renderer and the TeX engine write: elements, double-quoted attributes and character
 * data. Returns the top elements. Anything else (a document type, CDATA, an unclosed element) is an error.
 */
export function parseSvg(source: string): readonly SvgElement[] {
  const root: OpenElement = { name: "", attributes: {}, children: [], text: "" }
  const open: OpenElement[] = [root]
  let end = 0
  for (const match of source.matchAll(token)) {
    if (match.index !== end) break
    end += match[0].length
    const [, closing, name, written, empty, text] = match
    const parent = open.at(-1)!
    if (text !== undefined) parent.text += decode(text)
    if (!name) continue
    if (closing) {
      if (parent.name !== name || open.length === 1)
        throw new Error(`SVG: </${name}> closes <${parent.name}>.`)
      open.pop()
      continue
    }
    const attributes: Record<string, string> = {}
    for (const [, key, value] of (written ?? "").matchAll(attribute)) attributes[key!] = decode(value!)
    const element: OpenElement = { name, attributes, children: [], text: "" }
    parent.children.push(element)
    if (!empty) open.push(element)
  }
  if (end !== source.length) throw new Error(`SVG: unexpected “${source.slice(end, end + 30)}”.`)
  if (open.length > 1) throw new Error(`SVG: <${open.at(-1)!.name}> is not closed.`)
  return root.children
}

/** Writes elements back; attributes keep their order, empty elements close themselves. */
export function writeSvg(elements: readonly SvgElement[]): string {
  return elements
    .map(({ name, attributes, children, text }) => {
      const written = Object.entries(attributes).map(([key, value]) => ` ${key}="${escapeXml(value)}"`)
      const inside = escapeXml(text) + writeSvg(children)
      return inside ? `<${name}${written.join("")}>${inside}</${name}>` : `<${name}${written.join("")}/>`
    })
    .join("")
}
