import type { BundleContent } from "./bundle-content"
import { datasetFolder, figureFolder } from "./bundle-files"

/** README of a bundle, first for the editor, then for a reader who recomputes. */
export function readmeText({
  manuscript,
  draft,
  people,
  figures,
  datasets,
  software,
}: BundleContent): string {
  const artwork = figures
    .map(
      (figure, index) =>
        `- Figure ${index + 1}, ${figure.title || figure.name}: \`${figureFolder(figure, index)}/\` (${figure.artwork.map((a) => a.format.toUpperCase()).join(", ")})`,
    )
    .join("\n")
  const data = datasets
    .map(
      (dataset) =>
        `- \`${datasetFolder(dataset)}/\`: ${dataset.fileName}, ${dataset.size} bytes, SHA-256 ${dataset.sha256}`,
    )
    .join("\n")
  return `# ${manuscript.title}

${draft.title}, locked ${draft.lockedAt} by ${draft.lockedBy}. Digest ${draft.digest}.

${people.map((person) => `${person.name} (${person.role})`).join(", ")}

## For the editor

Artwork at its printed size, fonts embedded:

${artwork}

\`tex/captions.tex\` holds the captions, \`tex/values.tex\` every number of the text as a macro.

## For the reader

${data}

Each figure's folder has its \`spec.json\` (what is plotted and fitted), \`results.json\` (numbers, intervals, warnings) and \`data/\` (the
plotted points as CSV with a schema). With the product's source, \`npm run --silent verify -- bundle.zip\` checks every checksum, reads the
original files again, recomputes every number, redraws every figure and compares.

Made by ${software.name} ${software.version}, packages ${software.lockfileSha256}. Checksums: \`manifest-sha256.txt\` (BagIt, RFC 8493).
`
}
