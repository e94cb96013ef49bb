import type { Look } from "./drawing"

/**
 * The look that a figure has unless its manuscript or its panels say otherwise. Colours are those of Okabe and Ito
 * (Color Universal Design, 2008) ordered so that neighbours differ in lightness, without the yellow, whose contrast
 * with paper is 1.3; marker and dash repeat what the colour says.
 */
export const defaultLook: Look = {
  fontFamily: "Arimo",
  fontPt: 9,
  smallPt: 8,
  frameWidthPt: 0.5,
  curveWidthPt: 0.75,
  errorWidthPt: 0.5,
  markerSizePt: 3.4,
  tickLengthPt: 3.4,
  minorTickLengthPt: 1.9,
  labelGapPt: 9,
  palette: ["#0072B2", "#D55E00", "#009E73", "#CC79A7", "#E69F00", "#56B4E9", "#000000"],
  markers: [
    "circle",
    "square",
    "triangle",
    "diamond",
    "triangle-down",
    "open-circle",
    "open-square",
    "open-triangle",
  ],
  dashes: [[], [4, 1.6], [1, 1.4], [5, 1.5, 1, 1.5], [2.2, 1.2], [6, 1.5, 1, 1.2, 1, 1.5]],
  letter: { style: "(a)", bold: false },
  colorMap: "viridis",
}

/** The same look with every length multiplied, for a screen on which a printed point is `factor` pixels. */
export function scaleLook(look: Look, factor: number): Look {
  return {
    ...look,
    fontPt: look.fontPt * factor,
    smallPt: look.smallPt * factor,
    frameWidthPt: look.frameWidthPt * factor,
    curveWidthPt: look.curveWidthPt * factor,
    errorWidthPt: look.errorWidthPt * factor,
    markerSizePt: look.markerSizePt * factor,
    tickLengthPt: look.tickLengthPt * factor,
    minorTickLengthPt: look.minorTickLengthPt * factor,
    labelGapPt: look.labelGapPt * factor,
    dashes: look.dashes.map((dash) => dash.map((length) => length * factor)),
  }
}
