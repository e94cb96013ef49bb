import { Problem } from "@/lib/contracts/problems"
import { type ValuesForm, valuesTex } from "@/lib/domain/values-tex"
import type { Db } from "@/lib/server/db/client"
import { pinnedFigures } from "./draft-content"
import { type DraftPlace, getDraftRow } from "./drafts"

/** The named numbers of what a draft pins, in the order of the figures. @throws Problem `not-found` */
export async function listQuantities(db: Db, place: DraftPlace) {
  const { id } = await getDraftRow(db, place)
  return (await pinnedFigures(db, id)).flatMap(({ results, figureId, figureName, version }) =>
    (results?.panels ?? []).flatMap(({ quantities }, at) =>
      quantities.map((quantity) => ({
        quantity: { ...quantity },
        figureId,
        figureName,
        version,
        panel: at + 1,
      })),
    ),
  )
}

/** values.tex of a draft as it is now. @throws Problem `conflict` for names that cannot be macros, or are shared */
export async function draftValuesTex(db: Db, place: DraftPlace, form: ValuesForm): Promise<string> {
  const { manuscriptTitle, title } = await getDraftRow(db, place)
  const sources = (await listQuantities(db, place)).map(({ quantity, figureName, version }) => ({
    quantity,
    figure: figureName,
    version,
  }))
  try {
    return valuesTex(sources, `${manuscriptTitle}, ${title}`, form)
  } catch (error) {
    throw new Problem("conflict", (error as Error).message)
  }
}
