/** Draws one figure in a process of its own and prints the SHA-256 of each of its formats as JSON. */
import { createHash } from "node:crypto"
import { exampleFigure } from "./example-figure"
import { renderFigure, svgToEps, svgToPdf, svgToPng, svgToTiff } from "@/lib/render"

const digest = (bytes: Uint8Array | string) => createHash("sha256").update(bytes).digest("hex")

async function main(): Promise<void> {
  const { spec, results } = exampleFigure()
  const { svg } = await renderFigure(spec, results)
  const digests = {
    svg: digest(svg),
    png: digest(await svgToPng(svg, { dpi: 150 })),
    tiff: digest(await svgToTiff(svg, { dpi: 150 })),
    pdf: digest(await svgToPdf(svg)),
    eps: digest(await svgToEps(svg)),
  }
  process.stdout.write(JSON.stringify(digests))
}

void main()
