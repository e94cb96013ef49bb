import type { BundleFile } from "./bundle-files"
import { artworkPath, figureFolder, originalPath } from "./bundle-paths"
import type { DraftRecord, RecordedSoftware } from "./draft-record"

const mediaTypes: Record<string, string> = {
  svg: "image/svg+xml",
  png: "image/png",
  pdf: "application/pdf",
  eps: "application/postscript",
  tiff: "image/tiff",
  json: "application/json",
  csv: "text/csv",
  tex: "application/x-tex",
  md: "text/markdown",
}

const mediaType = (path: string) => mediaTypes[path.split(".").pop() ?? ""] ?? "application/octet-stream"
const reference = (path: string) => ({ "@id": encodeURI(path) })

/** How each figure came about: from which files, by which program, to which files. */
function creations({ figures, datasets }: DraftRecord) {
  return figures.map((figure, at) => {
    const folder = figureFolder(figure, at)
    const used = datasets.filter((dataset) =>
      figure.inputs.some((input) => input.dataset === dataset.name && input.number === dataset.number),
    )
    return {
      "@id": `#figure-${at + 1}`,
      "@type": "CreateAction",
      name: `Figure ${at + 1}: ${figure.title || figure.name}, version ${figure.version}`,
      instrument: { "@id": "#software" },
      object: [reference(`${folder}/spec.json`), ...used.map((dataset) => reference(originalPath(dataset)))],
      result: [
        reference(`${folder}/results.json`),
        ...figure.artwork.map(({ format }) => reference(artworkPath(figure, at, format))),
      ],
    }
  })
}

/** ro-crate-metadata.json of a bundle. @see RO-Crate 1.2, https://www.researchobject.org/ro-crate/specification/1.2/ */
export function roCrate(
  record: DraftRecord,
  software: RecordedSoftware,
  files: readonly BundleFile[],
): object {
  const { manuscript, draft, people } = record
  const authors = people
    .filter((person) => person.role !== "reader")
    .map((person, index) => ({
      "@id": person.orcid ? `https://orcid.org/${person.orcid}` : `#person-${index + 1}`,
      "@type": "Person",
      name: person.name,
    }))
  const actions = creations(record)
  return {
    "@context": "https://w3id.org/ro/crate/1.2/context",
    "@graph": [
      {
        "@id": "ro-crate-metadata.json",
        "@type": "CreativeWork",
        conformsTo: { "@id": "https://w3id.org/ro/crate/1.2" },
        about: { "@id": "./" },
      },
      {
        "@id": "./",
        "@type": "Dataset",
        name: `${manuscript.title}: figures and data, ${draft.title}`,
        description:
          manuscript.abstract || `Figures of “${manuscript.title}” with the data and specs behind them.`,
        datePublished: draft.lockedAt.slice(0, 10),
        license: { "@id": "#licence" },
        author: authors.map(({ "@id": id }) => ({ "@id": id })),
        hasPart: files.map(({ path }) => reference(path)),
        mentions: actions.map(({ "@id": id }) => ({ "@id": id })),
        identifier: `sha256:${draft.digest}`,
      },
      {
        "@id": "#licence",
        "@type": "CreativeWork",
        name: "To be stated by the authors",
        description: "The authors have not chosen a licence in the product; ask them before reuse.",
      },
      {
        "@id": "#software",
        "@type": "SoftwareApplication",
        name: software.name,
        softwareVersion: software.version,
      },
      ...authors,
      ...actions,
      ...files.map((file) => ({
        ...reference(file.path),
        "@type": "File",
        name: file.path.split("/").pop(),
        encodingFormat: mediaType(file.path),
        contentSize: String("bytes" in file ? file.bytes.length : file.size),
      })),
    ],
  }
}
