import { createRequire } from "node:module"
import path from "node:path"
import { pathToFileURL } from "node:url"
import { liteAdaptor } from "@mathjax/src/js/adaptors/liteAdaptor.js"
import { RegisterHTMLHandler } from "@mathjax/src/js/handlers/html.js"
import { TeX } from "@mathjax/src/js/input/tex.js"
import "@mathjax/src/js/input/tex/ams/AmsConfiguration.js"
import "@mathjax/src/js/input/tex/base/BaseConfiguration.js"
import "@mathjax/src/js/input/tex/boldsymbol/BoldsymbolConfiguration.js"
import "@mathjax/src/js/input/tex/braket/BraketConfiguration.js"
import "@mathjax/src/js/input/tex/cancel/CancelConfiguration.js"
import "@mathjax/src/js/input/tex/gensymb/GensymbConfiguration.js"
import "@mathjax/src/js/input/tex/units/UnitsConfiguration.js"
import "@mathjax/src/js/input/tex/upgreek/UpgreekConfiguration.js"
import { mathjax } from "@mathjax/src/js/mathjax.js"
import { SVG } from "@mathjax/src/js/output/svg.js"
import "@mathjax/src/js/util/asyncLoad/esm.js"
import { MathJaxStix2Font } from "@mathjax/mathjax-stix2-font/js/svg.js"

/** A formula as the engine leaves it: viewBox and children of its <svg>, in thousandths of an em. */
export interface RawFormula {
  readonly viewBox: string | null
  readonly body: string
}

/** Converts one formula; throws the engine's own error, whose message says what is wrong with the TeX. */
export type TexEngine = (tex: string) => RawFormula

/** Packages that only typeset. None that links, loads, scripts, defines macros or passes HTML through. */
const packages = ["base", "ams", "boldsymbol", "braket", "upgreek", "cancel", "units", "gensymb"]

async function startEngine(): Promise<TexEngine> {
  const adaptor = liteAdaptor()
  RegisterHTMLHandler(adaptor)
  const input = new TeX({
    packages,
    maxMacros: 200,
    maxBuffer: 2048,
    maxTemplateSubtitutions: 200,
    formatError: (_jax: unknown, error: Error) => {
      throw error
    },
  })
  const fontFile = createRequire(import.meta.url).resolve(
    "@mathjax/mathjax-stix2-font/mjs/svg/dynamic/math.js",
  )
  const output = new SVG({
    fontCache: "none",
    linebreaks: { inline: false },
    fontData: new MathJaxStix2Font({ dynamicPrefix: pathToFileURL(path.dirname(fontFile)).href }),
  })
  const document = mathjax.document("", { InputJax: input, OutputJax: output })
  // With every part of the font in memory conversion is synchronous.
  await output.font.loadDynamicFiles()
  return (tex) => {
    // The viewBox is at least em/1000 wide: em must be small or narrow letters come out one em wide.
    const node = document.convert(tex, { display: false, em: 1, ex: 0.5, containerWidth: 1e6 })
    const svg = adaptor.tags(node, "svg")[0]
    if (!svg) return { viewBox: null, body: "" }
    return {
      viewBox: (adaptor.getAttribute(svg, "viewBox") as string | null) || null,
      body: adaptor
        .childNodes(svg)
        .map((child) => adaptor.serializeXML(child as never))
        .join(""),
    }
  }
}

let engine: Promise<TexEngine> | undefined

/** The process's one TeX engine; the first call takes about half a second. */
export const texEngine = (): Promise<TexEngine> => (engine ??= startEngine())
