import { describe, expect, test } from "vitest"
import { LabelError } from "@specs/chart/label-error"
import { parseSvg } from "../svg/parse-svg"
import { faces, findFace, openFont } from "./fonts"
import { formulaSetter } from "./set-formula"
import { advanceEm, setLabel } from "./set-label"
import { typesetLabel, typesetMath } from "./typesetter"

const codeOf = async (tex: string) => {
  const set = await typesetMath(tex)
  return "error" in set ? set.error.code : "set"
}

describe("widths of text", () => {
  // Measured with Chromium 156: getComputedTextLength of SVG text at 100 px in the same font files, in em.
  test.each([
    ["Arimo", false, "Evolution time", 6.28078],
    ["Arimo", false, "Temperature AVATAR", 9.54063],
    ["Arimo", false, "αβγ Time τ", 4.78906],
    ["Arimo", false, "\u22120.498(6)", 4.30859],
    ["Arimo", false, "To Ty We", 4.13141],
    ["Arimo", true, "Density n(t)/n0", 6.94484],
    ["STIX Two Text", false, "Evolution time", 6.29],
    ["STIX Two Text", false, "αβγ Time τ", 4.61313],
    ["STIX Two Text", false, "To Ty We", 3.85609],
  ] as const)("%s (bold: %s) “%s” is %d em, as in a browser", (family, bold, text, widthEm) => {
    expect(Math.abs(advanceEm(text, family, bold, false) - widthEm)).toBeLessThan(0.003)
  })

  test("every face opens and has the signs that numbers need", () => {
    for (const face of faces)
      for (const sign of "0123456789\u2212×.") {
        expect(openFont(face).hasGlyphForCodePoint(sign.codePointAt(0)!), `${face.file} ${sign}`).toBe(true)
      }
  })

  test("a character that a face lacks comes from the mathematics font, one that none has is an error", async () => {
    const formula = await formulaSetter()
    expect(findFace("Arimo", false, false)).toBeDefined()
    const { runs } = setLabel("a∝b", formula, { family: "Arimo" })
    expect(runs.map((run) => run.type === "text" && run.family)).toEqual(["Arimo", "STIX Two Math", "Arimo"])
    expect(() => setLabel("ab漢", formula, { family: "Arimo" })).toThrowError(
      expect.objectContaining({ code: "glyph-missing", column: 3 }),
    )
  })
})

describe("formulas", () => {
  test("narrow letters are narrow: x is 0.559 em in the STIX italic", async () => {
    // Advance width of U+1D465 in STIX Two Math, 559 of 1000 units.
    expect(await typesetMath("x")).toMatchObject({ w: 0.559 })
  })

  test.each([
    ["\\frac{a}{b}", "set"],
    ["\\langle\\hat n_k(t)\\rangle\\propto t^{-1/2}", "set"],
    ["\\cancel{x}+\\overline{abc}", "set"],
    ["\\frac{", "tex-invalid"],
    ["\\foo", "tex-invalid"],
    ["x^2^3", "tex-invalid"],
    ["%", "tex-invalid"],
    ["漢", "glyph-missing"],
    ["a\\\\b", "tex-forbidden"],
    ["\\rule{9em}{9em}", "tex-forbidden"],
    ['\\mmlToken{mi}[href="javascript:alert(1)"]{x}', "tex-forbidden"],
    ["\\href{javascript:alert(1)}{x}", "tex-forbidden"],
    ["\\def\\a{\\a\\a}\\a", "tex-forbidden"],
    [`${"x".repeat(501)}`, "tex-too-long"],
    ["WWWWWWWWWW".repeat(9), "tex-too-large"],
  ])("%s: %s", async (tex, code) => expect(await codeOf(tex)).toBe(code))

  test("the body is shapes and geometry, whatever the TeX", async () => {
    const shapes = new Set(["g", "path", "rect", "line", "svg"])
    const check = (elements: ReturnType<typeof parseSvg>) => {
      for (const { name, attributes, children, text } of elements) {
        expect(shapes).toContain(name)
        expect(text).toBe("")
        for (const key of Object.keys(attributes))
          expect(key).not.toMatch(/^(on|data-|xlink|href|class|id|style)/)
        check(children)
      }
    }
    for (const tex of [
      "\\frac{\\sqrt x}{\\boxed{y}}",
      "\\text{a<b & c}",
      "\\overbrace{aaaaaaaaaaaaa}^n",
      "\\cancel{x}",
    ]) {
      const set = await typesetMath(tex)
      if ("error" in set) throw new Error(set.error.message)
      check(parseSvg(set.body))
    }
  })

  test("for a page: in the colour of its text, named for readers who cannot see it", async () => {
    const set = await typesetMath("a<b")
    if ("error" in set) throw new Error(set.error.message)
    const [svg] = parseSvg(set.svg)
    expect(svg!.attributes).toMatchObject({ role: "img", "aria-label": "a<b", fill: "currentColor" })
  })
})

describe("labels", () => {
  test("text and mathematics stand side by side on one baseline", async () => {
    const text = await typesetLabel("Density ")
    const math = await typesetMath("n(t)")
    const both = await typesetLabel("Density $n(t)$")
    if ("error" in math) throw new Error(math.error.message)
    expect(both.widthEm).toBeCloseTo(text.widthEm + math.w, 6)
    expect(both.depthEm).toBeGreaterThanOrEqual(math.d)
    expect(parseSvg(both.svg)[0]!.children.map(({ name }) => name)).toEqual(["text", "g"])
  })

  test("powers of ten are set in the figure's own face", async () => {
    const { svg } = await typesetLabel("$10^{-3}$")
    expect(parseSvg(svg)[0]!.children.map(({ name, text }) => `${name} ${text}`)).toEqual([
      "text 10",
      "text \u22123",
    ])
  })

  test("an error says at which character of the label", async () => {
    await expect(typesetLabel("Density $n \\rule{1em}{1em}$")).rejects.toMatchObject({
      name: "LabelError",
      code: "tex-forbidden",
      column: 12,
    } satisfies Partial<LabelError>)
  })
})
