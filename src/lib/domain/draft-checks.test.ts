import { expect, test } from "vitest"
import { type CheckedFigure, draftChecks } from "./draft-checks"
import type { Quantity } from "./quantity"

const quantity = (name: string): Quantity => ({
  name,
  value: 1,
  standardError: null,
  interval: null,
  text: "1",
  tex: "1",
})
const figure = (changes: Partial<CheckedFigure> = {}): CheckedFigure => ({
  name: "decay",
  version: 2,
  newest: 2,
  caption: "Decay.",
  ready: true,
  staleData: [],
  quantities: [],
  warnings: [],
  ...changes,
})
const settled = { figures: [figure()], waitingFor: [], openMustSettle: 0 }
const codes = (...draft: Parameters<typeof draftChecks>) =>
  draftChecks(...draft).map(({ code, weight, where }) => `${where}: ${code} (${weight})`)

test("nothing stands before the lock of a settled draft", () => {
  expect(draftChecks(settled)).toEqual([])
})

test("what forbids the lock", () => {
  const figures = [
    figure({ ready: false, caption: "{", quantities: [quantity("alpha"), quantity("beta1")] }),
    figure({ name: "front", quantities: [quantity("speed")] }),
    figure({ name: "growth", quantities: [quantity("speed")] }),
  ]
  expect(codes({ ...settled, figures })).toEqual([
    "decay: not-computed (must-fix)",
    "decay: caption-tex (must-fix)",
    "decay: quantity-name (must-fix)",
    "decay: quantity-name (must-fix)",
    "growth: quantity-shared (must-fix)",
  ])
  expect(codes({ ...settled, figures: [] })).toEqual(["draft: nothing-pinned (must-fix)"])
})

test("what needs a reason, and what is told only", () => {
  const warning = { code: "short-window", severity: "severe", message: "Half a decade." }
  const figures = [
    figure({
      newest: 3,
      caption: " ",
      staleData: ["annihilation"],
      warnings: [warning, { ...warning, severity: "note" }],
    }),
  ]
  expect(codes({ figures, waitingFor: ["Noor"], openMustSettle: 2 })).toEqual([
    "decay: caption-missing (caution)",
    "decay: newer-version (caution)",
    "decay: newer-data (caution)",
    "decay: short-window (caution)",
    "draft: sign-offs-missing (needs-reason)",
    "draft: threads-open (needs-reason)",
  ])
})
