import { rememberBoxes, type MathBox } from "@/lib/client/typeset"
import { typesetMath } from "@/lib/render/typeset/typesetter"

/** The TeX between unescaped dollar signs of a text. */
const formulasIn = (text: string) => text.split(/(?<!\\)\$/).filter((_, index) => index % 2 === 1)

/**
 * Sets the formulas of the texts on a page, so that the first paint has them.
 *
 * @returns the boxes by their TeX, to be handed to the page's islands
 */
export async function typesetPage(
  texts: readonly (string | null | undefined)[],
): Promise<Record<string, MathBox | null>> {
  const tex = [...new Set(texts.flatMap((text) => (text ? formulasIn(text) : [])))]
  const boxes = Object.fromEntries(
    await Promise.all(
      tex.map(async (source) => {
        const set = await typesetMath(source)
        return [source, "error" in set ? null : { w: set.w, h: set.h, d: set.d, body: set.body }] as const
      }),
    ),
  )
  rememberBoxes(boxes)
  return boxes
}
