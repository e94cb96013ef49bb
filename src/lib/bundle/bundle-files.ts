import { canonicalJson } from "@/lib/domain/canonical-json"
import { valuesTex } from "@/lib/domain/values-tex"
import type { DrawnSeries } from "@specs/figure-kind"
import type { ResultsDocument } from "@specs/results-document"
import type { BundleContent, BundledDataset, BundledFigure } from "./bundle-content"
import { readmeText } from "./readme-text"
import { roCrate } from "./ro-crate"
import { seriesCsv, seriesName, seriesSchema } from "./series-csv"

/** A file of the payload. Large ones come as a stream with their checksum known beforehand. */
export type BundleFile =
  | { readonly path: string; readonly bytes: Uint8Array }
  | {
      readonly path: string
      readonly sha256: string
      readonly size: number
      readonly stream: () => AsyncIterable<Uint8Array>
    }

const text = (path: string, content: string): BundleFile => ({
  path,
  bytes: new TextEncoder().encode(content),
})
const json = (path: string, value: unknown): BundleFile => text(path, `${JSON.stringify(value, null, 2)}\n`)
const decode = (bytes: Uint8Array) => new TextDecoder().decode(bytes)

/** File names that journals and preprint servers take: letters, digits, dots, dashes and underscores. */
export const plainName = (name: string) =>
  name.replace(/[^A-Za-z0-9._-]+/g, "_").replace(/^[._-]+/, "") || "file"

export const figureFolder = (figure: { readonly name: string }, index: number) =>
  `figures/${String(index + 1).padStart(2, "0")}-${plainName(figure.name)}`
export const datasetFolder = (dataset: { readonly name: string; readonly number: number }) =>
  `datasets/${plainName(dataset.name)}/version-${dataset.number}`

function figureFiles(figure: BundledFigure, index: number): BundleFile[] {
  const folder = figureFolder(figure, index)
  const panels = JSON.parse(decode(figure.series)) as DrawnSeries[][]
  return [
    ...figure.artwork.map(({ format, bytes }) => ({
      path: `${folder}/figure-${index + 1}.${format}`,
      bytes,
    })),
    text(`${folder}/spec.json`, canonicalJson(figure.spec)),
    { path: `${folder}/results.json`, bytes: figure.results },
    { path: `${folder}/series.json`, bytes: figure.series },
    ...panels.flatMap((all, panel) =>
      all.flatMap((series) => [
        text(`${folder}/data/${seriesName(panel, series)}.csv`, seriesCsv(series)),
        json(`${folder}/data/${seriesName(panel, series)}.schema.json`, seriesSchema(series)),
      ]),
    ),
  ]
}

function datasetFiles(dataset: BundledDataset): BundleFile[] {
  const folder = datasetFolder(dataset)
  return [
    {
      path: `${folder}/${plainName(dataset.fileName)}`,
      sha256: dataset.sha256,
      size: dataset.size,
      stream: dataset.bytes,
    },
    json(`${folder}/reading.json`, {
      fileName: plainName(dataset.fileName),
      recipe: dataset.recipe,
      columns: dataset.columns,
    }),
  ]
}

function captionsTex({ figures }: BundleContent): string {
  return figures
    .map(
      (figure, index) =>
        `% ${figure.name}, version ${figure.version}\n\\newcommand{\\captionOf${letters(index)}}{%\n${figure.caption.trim()}%\n}\n% Statistics: ${figure.sentence}\n`,
    )
    .join("\n")
}

/** 0 is A, 25 Z, 26 AA: macro names hold letters only. */
function letters(index: number): string {
  const own = String.fromCharCode(65 + (index % 26))
  return index < 26 ? own : letters(Math.floor(index / 26) - 1) + own
}

/** All payload files of a bundle, paths relative to the payload, in the order of their paths. */
export function bundleFiles(content: BundleContent): readonly BundleFile[] {
  const quantities = content.figures.flatMap((figure) =>
    (JSON.parse(decode(figure.results)) as ResultsDocument).panels.flatMap((panel) =>
      panel.quantities.map((quantity) => ({ quantity, figure: figure.name, version: figure.version })),
    ),
  )
  const files = [
    ...content.figures.flatMap(figureFiles),
    ...content.datasets.flatMap(datasetFiles),
    text("tex/values.tex", valuesTex(quantities, `${content.manuscript.title}, ${content.draft.title}`)),
    text("tex/captions.tex", captionsTex(content)),
    json("draft.json", draftRecord(content)),
    text("README.md", readmeText(content)),
  ]
  const all = [...files, json("ro-crate-metadata.json", roCrate(content, files))]
  return all.sort((a, b) => (a.path < b.path ? -1 : 1))
}

/** What was locked: enough to check the digest and to find every file. */
function draftRecord({ manuscript, draft, people, figures, software }: BundleContent) {
  return {
    format: "afterquench-bundle",
    formatVersion: 1,
    manuscript,
    draft,
    people,
    software,
    figures: figures.map((figure, index) => ({
      name: figure.name,
      title: figure.title,
      caption: figure.caption,
      version: figure.version,
      folder: figureFolder(figure, index),
      sentence: figure.sentence,
      inputs: figure.inputs.map((input) => ({
        ...input,
        folder: datasetFolder({ name: input.dataset, number: input.number }),
      })),
      artwork: figure.artwork.map(({ format, dpi }) => ({ format, dpi })),
      software: figure.software,
    })),
  }
}
