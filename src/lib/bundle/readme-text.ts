import { datasetFolder, figureFolder } from "./bundle-paths"
import type { DraftRecord, RecordedSoftware } from "./draft-record"

/** README of a bundle, first for the editor, then for a reader who recomputes. */
export function readmeText(
  { manuscript, draft, people, figures, datasets }: DraftRecord,
  software: RecordedSoftware,
): string {
  const artwork = figures.map(
    (figure, at) =>
      `- Figure ${at + 1}, ${figure.title || figure.name}: \`${figureFolder(figure, at)}/\` (${figure.artwork.map(({ format }) => format.toUpperCase()).join(", ")})`,
  )
  const data = datasets.map(
    (dataset) =>
      `- \`${datasetFolder(dataset)}/\`: ${dataset.fileName}, ${dataset.size} bytes, SHA-256 ${dataset.sha256}`,
  )
  const names = people.map(({ name, role, orcid }) => `${name} (${role}${orcid ? `, ORCID ${orcid}` : ""})`)
  return `# ${manuscript.title}

${draft.title}, locked ${draft.lockedAt} by ${draft.lockedBy}. Digest ${draft.digest}.
${draft.lockReason === null ? "" : `\nLocked although not everything was settled: ${draft.lockReason}\n`}
${names.join("; ")}

## For the editor

Artwork at its printed size, fonts embedded:

${artwork.join("\n")}

\`tex/captions.tex\` holds the captions, \`tex/values.tex\` every number of the text as a macro (\`tex/values-siunitx.tex\` for the
siunitx package).

## For the reader

The files as they were uploaded:

${data.join("\n")}

\`reading.json\` beside a file says how it was read. Each figure's folder has its \`spec.json\` (what is plotted and fitted), \`results.json\`
(numbers, intervals, warnings) and \`data/\` (the plotted points as CSV, each with a Table Schema). With the product's source,
\`npm run --silent verify -- bundle.zip\` checks every checksum, reads the original files again, recomputes every number, redraws every
figure and compares; \`draft.json\` names the versions that made them.

Made by ${software.name} ${software.version}, packages ${software.lockfileSha256}. Checksums: \`manifest-sha256.txt\` (BagIt, RFC 8493).
`
}
