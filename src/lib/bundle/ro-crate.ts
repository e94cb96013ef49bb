import type { BundleContent } from "./bundle-content"

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

/** ro-crate-metadata.json of a bundle. @see RO-Crate 1.2, https://www.researchobject.org/ro-crate/specification/1.2/ */
export function roCrate(
  { manuscript, draft, people, software }: BundleContent,
  files: readonly { readonly path: string }[],
): object {
  const authors = people
    .filter((person) => person.role !== "reader")
    .map((person, index) => ({
      "@id": person.orcid ? `https://orcid.org/${person.orcid}` : `#person-${index + 1}`,
      "@type": "Person",
      name: person.name,
    }))
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
        hasPart: files.map(({ path }) => ({ "@id": encodeURI(path) })),
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
      ...files.map(({ path }) => ({
        "@id": encodeURI(path),
        "@type": "File",
        encodingFormat: mediaType(path),
      })),
    ],
  }
}
