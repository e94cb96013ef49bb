import { figureSpec } from "@specs/figure-spec"
import { describe, expect, test } from "vitest"
import { changeSpec, openSpec } from "./spec-document"

const spec = figureSpec.parse({
  version: 1,
  panels: [
    {
      kind: "decay-exponent",
      data: { dataset: "ring", columns: { trajectory: "run", time: "t", observable: "n" } },
      fit: { window: [20, 2000] },
    },
  ],
})
const windowOf = (document: ReturnType<typeof openSpec>) => {
  const panel = document.spec.panels[0]!
  return "fit" in panel && panel.fit && "window" in panel.fit ? panel.fit.window : null
}

describe("the edited spec", () => {
  test("a slot, the sheet and undo edit one document", () => {
    let document = openSpec(spec)
    document = changeSpec(document, { type: "set", pointer: "/panels/0/fit/window", value: [50, 2000] })
    expect(windowOf(document)).toEqual([50, 2000])
    expect(document.text).toContain("50")
    document = changeSpec(document, { type: "text", text: document.text.replace("50", "80") })
    expect(windowOf(document)).toEqual([80, 2000])
    document = changeSpec(changeSpec(document, { type: "undo" }), { type: "undo" })
    expect(windowOf(document)).toEqual([20, 2000])
    document = changeSpec(document, { type: "redo" })
    expect(windowOf(document)).toEqual([50, 2000])
  })

  test("one drag is one step of undo", () => {
    let document = openSpec(spec)
    for (const low of [21, 22, 23])
      document = changeSpec(document, {
        type: "set",
        pointer: "/panels/0/fit/window/0",
        value: low,
        gesture: "drag-1",
      })
    expect(windowOf(changeSpec(document, { type: "undo" }))).toEqual([20, 2000])
  })

  test("an invalid change is refused with its place and leaves the spec alone", () => {
    const document = changeSpec(openSpec(spec), {
      type: "set",
      pointer: "/panels/0/fit/window",
      value: [2000, 20],
    })
    expect(windowOf(document)).toEqual([20, 2000])
    expect(document.issues[0]!.pointer).toBe("/panels/0/fit/window")
  })

  test("half-typed JSON keeps the last valid spec", () => {
    const document = changeSpec(openSpec(spec), { type: "text", text: '{"version": 1,' })
    expect(document.issues[0]!.code).toBe("not-json")
    expect(document.spec).toBe(spec)
  })
})
