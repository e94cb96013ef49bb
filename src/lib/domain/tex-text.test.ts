import { describe, expect, test } from "vitest"
import { captionProblem, texOfText } from "./tex-text"

describe("plain words as TeX", () => {
  test("what TeX would take for a command is escaped", () => {
    expect(texOfText("95 % of run_1 & {x} #2 ~ \\n")).toBe(
      "95 \\% of run\\_1 \\& \\{x\\} \\#2 \\textasciitilde{} \\textbackslash{}n",
    )
  })
  test("formulas stay as they are", () => {
    expect(texOfText("$t_{1}$ from 20–2000, $\\alpha$")).toBe("$t_{1}$ from 20--2000, $\\alpha$")
  })
  test("signs that text fonts lack become mathematics", () => {
    expect(texOfText("γ = −0.5(1) × 10² ⟨n⟩ Δ")).toBe(
      "$\\gamma$ = $-$0.5(1) $\\times$ 10$^{2}$ $\\langle$n$\\rangle$ $\\Delta$",
    )
  })
})

test("captions whose braces or dollars do not pair", () => {
  expect(captionProblem("Decay of $\\langle n \\rangle$ in {\\em one} \\{ dimension, 5\\% \\$")).toBeNull()
  expect(captionProblem("a % not {counted\nb")).toBeNull()
  expect(captionProblem("{a")).toMatch(/never closed/)
  expect(captionProblem("a} {")).toMatch(/no opening/)
  expect(captionProblem("costs $5")).toMatch(/no partner/)
})
