import type { RecordedDataset } from "./draft-record"

/** File names that journals and preprint servers take: letters, digits, dots, dashes and underscores. */
export const plainName = (name: string) =>
  name.replace(/[^A-Za-z0-9._-]+/g, "_").replace(/^[._-]+/, "") || "file"

/** A title as the name of a folder. */
const slug = (title: string) =>
  title
    .normalize("NFKD")
    .replace(/[^A-Za-z0-9]+/g, "-")
    .replace(/^-+|-+$/g, "")
    .toLowerCase()
    .slice(0, 60) || "manuscript"

interface NamedDraft {
  readonly manuscript: { readonly title: string }
  readonly draft: { readonly number: number }
}

/** Name of the bag and, with ".zip", of its file. */
export const bagName = ({ manuscript, draft }: NamedDraft) =>
  `${slug(manuscript.title)}-draft-${draft.number}`

/** Folder of a figure; `at` counts from 0. */
export const figureFolder = (figure: { readonly name: string }, at: number) =>
  `figures/${String(at + 1).padStart(2, "0")}-${plainName(figure.name)}`

/** File of a figure's artwork, named as a journal wants it. */
export const artworkPath = (figure: { readonly name: string }, at: number, format: string) =>
  `${figureFolder(figure, at)}/figure-${at + 1}.${format}`

export const datasetFolder = ({ name, number }: { readonly name: string; readonly number: number }) =>
  `datasets/${plainName(name)}/version-${number}`

/** In a folder of its own, whatever its name: reading.json lies beside that folder. */
export const originalPath = (dataset: RecordedDataset) =>
  `${datasetFolder(dataset)}/original/${plainName(dataset.fileName)}`
