import { z } from "zod"
import { annotations } from "./annotations"
import { dataBinding } from "./data-binding"
import { axes, label, namedQuantity, stylePatch } from "./panel-parts"
import { panelPlace } from "./place"

/** What every panel has, whatever it shows. */
export const panelBase = {
  place: panelPlace.prefault({ row: 1, column: 1 }),
  letter: z.string().max(3).optional(),
  title: label.optional(),
  data: dataBinding,
  axes: axes.prefault({}),
  quantities: z.array(namedQuantity).max(40).default([]),
  annotations,
  style: stylePatch,
}
