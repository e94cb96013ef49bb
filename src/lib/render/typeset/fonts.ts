import { createHash } from "node:crypto"
import { readFileSync } from "node:fs"
import { createRequire } from "node:module"
import path from "node:path"
import { create, type Font } from "fontkit"

/** One face of the figure fonts: family as it is named in the SVG, weight, style and its file in a package. */
export interface Face {
  readonly family: string
  readonly weight: 400 | 700
  readonly italic: boolean
  readonly file: string
}

const families = [
  ["Arimo", "arimo", "Arimo", true],
  ["STIX Two Text", "stix-two-text", "STIXTwoText", true],
  ["STIX Two Math", "stix-two-math", "STIXTwoMath", false],
] as const

/** All faces that a figure may use. STIX Two Math stands in for characters that a text face lacks. */
export const faces: readonly Face[] = families.flatMap(([family, folder, stem, complete]) =>
  (complete
    ? (["400Regular", "400Regular_Italic", "700Bold", "700Bold_Italic"] as const)
    : (["400Regular"] as const)
  ).map((cut): Face => ({
    family,
    weight: cut.startsWith("700") ? 700 : 400,
    italic: cut.endsWith("Italic"),
    file: `@expo-google-fonts/${folder}/${cut}/${stem}_${cut}.ttf`,
  })),
)

export const fallbackFamily = "STIX Two Math"

const require = createRequire(import.meta.url)
const bytes = new Map<string, Buffer>()
const fonts = new Map<string, Font>()

/** The bytes of a face's TrueType file, read once. */
export function fontBytes(face: Face): Buffer {
  let known = bytes.get(face.file)
  if (!known) bytes.set(face.file, (known = readFileSync(require.resolve(face.file))))
  return known
}

/** A face opened for measuring and outlining. */
export function openFont(face: Face): Font {
  let known = fonts.get(face.file)
  if (!known) {
    const font = create(fontBytes(face))
    if (!("layout" in font)) throw new Error(`${face.file} holds several fonts; one is expected.`)
    fonts.set(face.file, (known = font))
  }
  return known
}

/** The face for a family, weight and style; the fallback family has one face for all. */
export function findFace(family: string, bold: boolean, italic: boolean): Face | undefined {
  const cuts = faces.filter((face) => face.family === family)
  return cuts.find((face) => face.weight === (bold ? 700 : 400) && face.italic === italic) ?? cuts[0]
}

/** SHA-256 of every font file, by file name: part of what a proof depends on. */
export function fontDigests(): Record<string, string> {
  return Object.fromEntries(
    faces.map((face) => [
      path.basename(face.file),
      createHash("sha256").update(fontBytes(face)).digest("hex"),
    ]),
  )
}
