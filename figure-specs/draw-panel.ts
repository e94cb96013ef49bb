import type { Frame, PanelDrawing } from "./chart/drawing"
import type { PanelResult } from "./figure-kind"
import { kindOf, type AnyKind } from "./kinds"
import type { PanelParams } from "./registry"

/**
 * Draws a panel of any kind with all that its spec adds by hand.
 *
 * @param kind the registered kind of the panel unless one is being tried out
 */
export function drawPanel(
  panel: PanelParams,
  result: PanelResult,
  frame: Frame,
  kind: Pick<AnyKind, "build"> = kindOf(panel.kind),
): PanelDrawing {
  const annotations = "annotations" in panel ? panel.annotations : []
  return { ...kind.build(result, panel, frame), annotations }
}
