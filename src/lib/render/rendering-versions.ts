import { createRequire } from "node:module"
import { readFileSync } from "node:fs"
import path from "node:path"
import { fontDigests } from "./typeset/fonts"

/** What the look of a proof depends on besides its spec and results. */
export interface RenderingVersions {
  readonly vega: string
  readonly mathjax: string
  readonly mathFont: string
  readonly sharp: string
  /** SHA-256 of each font file, by its name. */
  readonly fonts: Readonly<Record<string, string>>
}

/** Version of an installed package, found upwards of one of its files because not all export their package.json. */
function installedVersion(name: string, entry = name): string {
  let folder = path.dirname(createRequire(import.meta.url).resolve(entry))
  for (;;) {
    try {
      const manifest = JSON.parse(readFileSync(path.join(folder, "package.json"), "utf8")) as Record<
        string,
        string
      >
      if (manifest["name"] === name) return manifest["version"]!
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== "ENOENT") throw error
    }
    const parent = path.dirname(folder)
    if (parent === folder) throw new Error(`The package ${name} has no package.json.`)
    folder = parent
  }
}

let known: RenderingVersions | undefined

/** Versions of everything that draws; stored with a figure version, part of its proof's identity. */
export const renderingVersions = (): RenderingVersions =>
  (known ??= {
    vega: installedVersion("vega"),
    mathjax: installedVersion("@mathjax/src", "@mathjax/src/package.json"),
    mathFont: installedVersion("@mathjax/mathjax-stix2-font", "@mathjax/mathjax-stix2-font/package.json"),
    sharp: installedVersion("sharp"),
    fonts: fontDigests(),
  })
