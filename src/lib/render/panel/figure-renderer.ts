import * as vega from "vega"
import { written } from "@specs/chart/position"

/** The parts of Vega's SVG string renderer that are overridden; its typings leave the class out. */
interface StringRenderer {
  attr(scene: unknown, item: unknown, attributes: unknown, tag?: string): Record<string, unknown>
  mark(markup: unknown, scene: { readonly marktype: string }): unknown
}
const scenegraph = vega as unknown as {
  SVGStringRenderer: new (loader: unknown) => StringRenderer
  renderModule(name: string, module?: Record<string, unknown>): Record<string, unknown>
}

/** Vega's SVG writer without links, type and group opacity. */
class FigureRenderer extends scenegraph.SVGStringRenderer {
  /** Vega asks the loader to sanitise links and lets the refusal end the process: there are none in a figure. */
  href(): null {
    return null
  }

  /**
   * Element opacity makes the rasteriser compose each mark on a page-sized layer, half a minute for some hundred marks at
   * 600 dpi. The same picture comes from the opacities of fill and stroke.
   */
  override attr(scene: unknown, item: unknown, attributes: unknown, tag?: string): Record<string, unknown> {
    const all = super.attr(scene, item, attributes, tag)
    if (all["opacity"] == null || tag === undefined || tag === "image") return all
    const { opacity, ...rest } = all
    const share = Number(opacity)
    if (share >= 1) return rest
    if (share <= 0) return { ...rest, display: "none" }
    for (const paint of ["fill", "stroke"]) {
      if (!rest[paint] || rest[paint] === "none") continue
      rest[`${paint}-opacity`] = written(Number(rest[`${paint}-opacity`] ?? 1) * share)
    }
    return rest
  }

  override mark(markup: unknown, scene: { readonly marktype: string }): unknown {
    if (scene.marktype === "text")
      throw new Error("A panel's Vega specification holds a text mark; text goes to PanelDrawing.labels.")
    return super.mark(markup, scene)
  }
}

/** Makes Vega write its SVG with the renderer above. */
export function useFigureRenderer(): void {
  scenegraph.renderModule("svg", { ...scenegraph.renderModule("svg"), headless: FigureRenderer })
}
