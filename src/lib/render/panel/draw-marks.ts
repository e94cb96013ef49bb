import * as vega from "vega"
import type { Ink } from "@specs/chart/free-place"
import { written } from "@specs/chart/position"
import { sceneInk, type SceneMark } from "@specs/chart/scene-ink"
import { useFigureRenderer } from "./figure-renderer"

useFigureRenderer()

/** A loader that loads nothing: a drawing holds its data, and its images are PNG data. */
function closedLoader(): vega.Loader {
  const refuse = async (address: string) => {
    throw new Error(`A figure may not load ${address.slice(0, 80)}.`)
  }
  const loader = vega.loader()
  return {
    ...loader,
    load: refuse,
    http: refuse,
    file: refuse,
    sanitize: async (address: string, options: { context?: string }) => {
      if (options.context === "image" && /^data:image\/png;base64,[A-Za-z0-9+/=]+$/.test(address))
        return { href: address }
      return refuse(address)
    },
  } as unknown as vega.Loader
}

/** Whatever Vega would print is a fault of the specification. */
const strictLogger = (): vega.LoggerInterface => {
  const fail = (...parts: readonly unknown[]): never => {
    throw new Error(`Vega: ${parts.join(" ")}`)
  }
  const logger = { level: () => 0, error: fail, warn: fail, info: () => logger, debug: () => logger }
  return logger as unknown as vega.LoggerInterface
}

interface SceneNode {
  readonly marktype?: string
  clip_id?: unknown
  items?: SceneNode[]
}

/** Clip ids come from a counter of the process and stay on groups: forget them so that each drawing counts anew. */
function forgetClipIds(node: SceneNode): void {
  if (node.clip_id !== undefined) delete node.clip_id
  // Only groups clip, and only they have items that have items.
  if (node.marktype === undefined || node.marktype === "group") node.items?.forEach(forgetClipIds)
}

/** A panel's marks as an SVG fragment with its origin at the frame's top left, and where their ink is. */
export interface DrawnMarks {
  readonly svg: string
  readonly ink: Ink
}

async function draw(spec: vega.Spec, prefix: string): Promise<DrawnMarks> {
  const view = new vega.View(vega.parse(spec), {
    renderer: "none",
    loader: closedLoader(),
    logger: strictLogger(),
  })
  try {
    await view.runAsync()
    const { root } = view.scenegraph() as unknown as { readonly root: SceneNode & SceneMark }
    forgetClipIds(root)
    const ink = sceneInk(root)
    vega.resetSVGDefIds()
    const whole = await view.toSVG()
    const svg = whole
      .replace(/^<svg[^>]*>/, "")
      .replace(/<\/svg>$/, "")
      .replace(/\bid="(clip\d+)"/g, `id="${prefix}$1"`)
      .replace(/url\(#(clip\d+)\)/g, `url(#${prefix}$1)`)
      .replace(
        /translate\(([^,)]+),([^)]+)\)/g,
        (_, x, y) => `translate(${written(Number(x))},${written(Number(y))})`,
      )
      // Vega's own frame and background are drawn by the layout, or not at all.
      .replace(/<path class="(?:background|foreground)"[^>]*(?:\/>|><\/path>)/g, "")
      .replace(/ (?:class|role|aria-[a-z]+)="[^"]*"/g, "")
    return { svg, ink }
  } finally {
    view.finalize()
  }
}

let queue: Promise<unknown> = Promise.resolve()

/**
 * Draws the marks of a panel. Drawings of one process wait for each other, because the ids that Vega hands out are
 * counted for the whole process.
 *
 * @param prefix put before every id, so that panels can stand in one document
 */
export function drawMarks(spec: vega.Spec, prefix: string): Promise<DrawnMarks> {
  const turn = queue.then(() => draw(spec, prefix))
  queue = turn.catch(() => undefined)
  return turn
}
