import { canonicalJson } from "@/lib/domain/canonical-json"
import type { RenderingFormat } from "@/lib/domain/states"
import { renderFigure, svgToEps, svgToPdf, svgToPng, svgToTiff } from "@/lib/render"
import { computeFigure } from "@specs/compute-figure"
import type { DataTable } from "@specs/figure-kind"
import type { FigureSpec } from "@specs/figure-spec"
import { kindOf } from "@specs/kinds"
import { resultsDocument } from "@specs/results-document"

export interface Artwork {
  readonly format: RenderingFormat
  /** Pixels an inch; null for what has no pixels. */
  readonly dpi: number | null
  readonly bytes: Uint8Array
}

/** Everything that follows from a spec and its data. */
export interface DerivedFigure {
  /** results.json in canonical form. */
  readonly results: Uint8Array
  /** The drawn series of each panel in canonical form. */
  readonly series: Uint8Array
  /** The statistics part of the caption. */
  readonly sentence: string
  readonly alternativeText: string
  readonly widthMm: number
  readonly heightMm: number
  readonly artwork: readonly Artwork[]
}

/** Resolutions of the proof on the screen, and of line art for print. */
const pngDpi = 300
const tiffDpi = 600

const encode = (value: unknown) => new TextEncoder().encode(canonicalJson(value))

/**
 * Computes and draws a figure: the same input gives the same bytes, on the server, and where a bundle is verified.
 *
 * @param tables the pinned data by dataset name
 * @throws SpecError for what cannot be computed; errors with `issues` for labels that cannot be set
 */
export async function deriveFigure(
  spec: FigureSpec,
  tables: ReadonlyMap<string, DataTable>,
  onProgress: (share: number, what: string) => void = () => {},
): Promise<DerivedFigure> {
  const results = computeFigure(spec, { tables }, (share) => onProgress(0.7 * share, "Computing"))
  onProgress(0.7, "Drawing")
  const { svg, widthMm, heightMm, alternativeText, notes } = await renderFigure(spec, results.panels)
  const artwork: Artwork[] = [
    { format: "eps", dpi: null, bytes: await svgToEps(svg) },
    { format: "pdf", dpi: null, bytes: await svgToPdf(svg, { title: spec.title }) },
    { format: "png", dpi: pngDpi, bytes: await svgToPng(svg, { dpi: pngDpi }) },
    { format: "svg", dpi: null, bytes: new TextEncoder().encode(svg) },
    { format: "tiff", dpi: tiffDpi, bytes: await svgToTiff(svg, { dpi: tiffDpi }) },
  ]
  const sentences = spec.panels.map(
    (panel, at) => kindOf(panel.kind).sentence(panel, results.panels[at]).plain,
  )
  return {
    results: encode(resultsDocument(results)),
    series: encode(results.panels.map((panel) => panel.series)),
    sentence: [...sentences, ...notes].join(" "),
    alternativeText,
    widthMm,
    heightMm,
    artwork,
  }
}
