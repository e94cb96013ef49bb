import type { Frame, PanelDrawing, PanelResult } from "@specs/figure-kind"
import type { PanelParams } from "@specs/registry"
import { build as decayExponent } from "@specs/decay-exponent/build"

/** How each kind draws itself, by its name. */
export type PanelBuilders = Readonly<
  Record<string, (result: PanelResult, params: PanelParams, frame: Frame) => PanelDrawing>
>

export const panelBuilders: PanelBuilders = {
  "decay-exponent": decayExponent as PanelBuilders[string],
}
