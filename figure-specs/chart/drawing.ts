import type { Spec } from "vega"
import type { Annotation } from "../schema/annotations"

/** Families that the figure fonts hold; docs/rendering.md says why these. */
export type FontFamily = "Arimo" | "STIX Two Text"

export const markerNames = [
  "circle",
  "square",
  "triangle",
  "diamond",
  "triangle-down",
  "open-circle",
  "open-square",
  "open-triangle",
] as const
export type MarkerName = (typeof markerNames)[number]

/** Type sizes, line widths and colours of a figure, in points of the printed page. */
export interface Look {
  readonly fontFamily: FontFamily
  /** Axis titles, legends, annotations, panel letters. */
  readonly fontPt: number
  /** Numbers at the ticks. */
  readonly smallPt: number
  readonly frameWidthPt: number
  readonly curveWidthPt: number
  readonly errorWidthPt: number
  /** Diameter of a round marker; the other shapes have its area. */
  readonly markerSizePt: number
  readonly tickLengthPt: number
  readonly minorTickLengthPt: number
  /** Least free distance between two tick labels; larger means fewer labels. */
  readonly labelGapPt: number
  readonly palette: readonly string[]
  readonly markers: readonly MarkerName[]
  /** Dash patterns of lines in points; an empty one is solid. */
  readonly dashes: readonly (readonly number[])[]
  readonly letter: { readonly style: "(a)" | "a" | "A"; readonly bold: boolean }
  /** Colour map of heat maps. */
  readonly colorMap: "viridis" | "cividis" | "RdBu"
}

/** The data rectangle that a panel draws into, in points. */
export interface Frame {
  readonly widthPt: number
  readonly heightPt: number
  readonly look: Look
}

/** One line of a legend, drawn by the figure's layout so that it can be shared between panels. */
export interface LegendEntry {
  readonly label: string
  readonly color: string
  readonly marker: MarkerName | null
  /** Dash pattern of the line through the key; [] is solid, null no line. */
  readonly dash: readonly number[] | null
  readonly widthPt: number
}

export interface Legend {
  readonly title: string | null
  readonly entries: readonly LegendEntry[]
}

export type ScaleType = "log" | "linear" | "symlog"

/** One axis as it is to be set: its scale and its ticks; the layout draws it on both sides of the frame. */
export interface AxisDrawing {
  /** Text with TeX between dollar signs; empty for none. */
  readonly title: string
  readonly scale: ScaleType
  readonly domain: readonly [number, number]
  /** Half-width of the linear part of a symlog scale. */
  readonly symlogConstant?: number
  /** Major ticks, increasing; an empty label is a tick without number. */
  readonly major: readonly { readonly value: number; readonly label: string }[]
  readonly minor: readonly number[]
  /** What all its numbers are to be multiplied with, set once at its end. */
  readonly factor?: string
}

/** A place for a text: a point of the frame (points, from its top left) and how the text hangs on it. */
export interface TextPlace {
  readonly x: number
  readonly y: number
  readonly align: "left" | "center" | "right"
  readonly baseline: "top" | "middle" | "alphabetic" | "bottom"
  /** Degrees, clockwise as in SVG. */
  readonly angle: number
}

/** Text within the frame. Of several places the layout takes the first that covers the least ink. */
export interface FrameLabel {
  readonly text: string
  readonly color: string
  readonly small?: boolean
  /** Left out where it would cover data or leave the frame: it says what the caption says too. */
  readonly optional?: boolean
  readonly places: readonly TextPlace[]
}

/** A scale of colours with its axis, set at the right of the panel. */
export interface ColorBarDrawing {
  readonly axis: AxisDrawing
  /** Colours from the lower to the upper end, #rrggbb. */
  readonly colors: readonly string[]
}

/**
 * What `build` hands to lib/render and to the working view. Vega draws the data and nothing that is type: axes, labels
 * and legend are set by the layout that both share, so that they stand at the same places in both.
 */
export interface PanelDrawing {
  /**
   * A Vega specification with `width` and `height` of the frame, scales named "x" and "y", data inlined, no URLs, and
   * neither axes nor legends nor text marks.
   */
  readonly spec: Spec
  readonly axes: {
    readonly x: AxisDrawing
    readonly y: AxisDrawing
    /** A second abscissa at the top; without it the lower one is repeated without numbers. */
    readonly top?: AxisDrawing
  }
  readonly legend: Legend
  readonly labels: readonly FrameLabel[]
  readonly colorBar: ColorBarDrawing | null
  /** Whether an image fills the frame, on which letters need paper of their own. */
  readonly filled?: boolean
  /** What the author put into the panel by hand; drawPanel takes it from the spec, kinds leave it out. */
  readonly annotations?: readonly Annotation[]
  /** What the reader of the caption must be told about the drawing: "Error bars at 24 of 200 times." */
  readonly notes: readonly string[]
  /** One sentence for readers who cannot see the figure. */
  readonly alternativeText: string
}
