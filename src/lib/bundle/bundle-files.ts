import { valuesTex, type QuantitySource } from "@/lib/domain/values-tex"
import type { DrawnSeries } from "@specs/figure-kind"
import type { ResultsDocument } from "@specs/results-document"
import { artworkPath, datasetFolder, figureFolder, originalPath } from "./bundle-paths"
import { captionsTex } from "./captions-tex"
import type { BundleContent, FigureBytes, RecordedDataset, RecordedFigure } from "./draft-record"
import { readmeText } from "./readme-text"
import { roCrate } from "./ro-crate"
import { seriesCsv, seriesNames, seriesSchema } from "./series-csv"

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
const parse = (bytes: Uint8Array): unknown => JSON.parse(new TextDecoder().decode(bytes))

function figureFiles(figure: RecordedFigure, at: number, bytes: FigureBytes): BundleFile[] {
  const folder = figureFolder(figure, at)
  const panels = parse(bytes.series) as DrawnSeries[][]
  return [
    ...figure.artwork.map(({ format }, index) => ({
      path: artworkPath(figure, at, format),
      bytes: bytes.artwork[index]!,
    })),
    { path: `${folder}/spec.json`, bytes: bytes.spec },
    { path: `${folder}/results.json`, bytes: bytes.results },
    { path: `${folder}/series.json`, bytes: bytes.series },
    ...panels.flatMap((all, panel) => {
      const names = seriesNames(panel, all)
      return all.flatMap((series, index) => [
        text(`${folder}/data/${names[index]}.csv`, seriesCsv(series)),
        json(`${folder}/data/${names[index]}.schema.json`, seriesSchema(series)),
      ])
    }),
  ]
}

/** The named quantities of the figures, in their order. */
function quantitiesOf({ record, figures }: BundleContent): QuantitySource[] {
  return record.figures.flatMap(({ name, version }, at) =>
    (parse(figures[at]!.results) as ResultsDocument).panels.flatMap(({ quantities }) =>
      quantities.map((quantity) => ({ quantity, figure: name, version })),
    ),
  )
}

/** All payload files of a bundle, paths relative to the payload, in the order of their paths. */
export function bundleFiles(content: BundleContent): readonly BundleFile[] {
  const { record, software, figures } = content
  const heading = `${record.manuscript.title}, ${record.draft.title}`
  const quantities = quantitiesOf(content)
  const originals = record.datasets.map((dataset) => ({
    path: originalPath(dataset),
    sha256: dataset.sha256,
    size: dataset.size,
    stream: () => content.original(dataset),
  }))
  const files: BundleFile[] = [
    ...record.figures.flatMap((figure, at) => figureFiles(figure, at, figures[at]!)),
    ...originals,
    ...record.datasets.map(readingFile),
    text("tex/values.tex", valuesTex(quantities, heading)),
    text("tex/values-siunitx.tex", valuesTex(quantities, heading, "siunitx")),
    text("tex/captions.tex", captionsTex(record)),
    json("draft.json", { ...record, software }),
    text("README.md", readmeText(record, software)),
  ]
  return [...files, json("ro-crate-metadata.json", roCrate(record, software, files))].sort((a, b) =>
    a.path < b.path ? -1 : 1,
  )
}

/** How a file is read, beside it: what `npm run table` and `npm run figure` take as a recipe. */
function readingFile(dataset: RecordedDataset): BundleFile {
  return json(`${datasetFolder(dataset)}/reading.json`, { recipe: dataset.recipe, columns: dataset.columns })
}
