import { readFileSync } from "node:fs"
import { describe, expect, test } from "vitest"

type Rgb = readonly [number, number, number]

/** OKLCH to linear sRGB; B. Ottosson, "A perceptual color space for image processing" (2020), the published matrices. */
function linearSrgb(lightness: number, chroma: number, hueDegrees: number): Rgb {
  const hue = (hueDegrees * Math.PI) / 180
  const a = chroma * Math.cos(hue)
  const b = chroma * Math.sin(hue)
  const l = (lightness + 0.3963377774 * a + 0.2158037573 * b) ** 3
  const m = (lightness - 0.1055613458 * a - 0.0638541728 * b) ** 3
  const s = (lightness - 0.0894841775 * a - 1.291485548 * b) ** 3
  const clamp = (x: number) => Math.min(1, Math.max(0, x))
  return [
    clamp(4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s),
    clamp(-1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s),
    clamp(-0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s),
  ]
}

/** Contrast ratio of WCAG 2.2, from relative luminance. */
function contrast(one: Rgb, other: Rgb): number {
  const luminance = ([r, g, b]: Rgb) => 0.2126 * r + 0.7152 * g + 0.0722 * b
  const [low, high] = [luminance(one), luminance(other)].sort((x, y) => x - y) as [number, number]
  return (high + 0.05) / (low + 0.05)
}

const css = readFileSync(new URL("./tokens.css", import.meta.url), "utf8")
const tokens = new Map(
  [...css.matchAll(/--([a-z-]+): light-dark\(oklch\(([\d. ]+)\), oklch\(([\d. ]+)\)\)/g)].map(
    ([, name, light, dark]) => {
      const color = (text: string) => linearSrgb(...(text.split(" ").map(Number) as [number, number, number]))
      return [name!, { light: color(light!), dark: color(dark!) }] as const
    },
  ),
)
const token = (name: string) => {
  const found = tokens.get(name)
  if (!found) throw new Error(`tokens.css has no ${name}`)
  return found
}

const grounds = ["paper", "paper-raised", "paper-sunk"]
const states = ["heat-work", "heat-proposed", "heat-settled", "heat-locked", "wrong"]
const themes = ["light", "dark"] as const

describe.each(themes)("contrast in the %s theme", (theme) => {
  const textPairs = [
    ...grounds.flatMap((ground) =>
      ["ink", "ink-soft", ...states.map((s) => `${s}-ink`)].map((t) => [t, ground]),
    ),
    ...states.flatMap((state) => [`${state}-ink`, "ink"].map((text) => [text, `${state}-tint`])),
    ["paper", "ink"],
    ["paper", "heat-locked-ink"],
  ] as [string, string][]
  test.each(textPairs)("text %s on %s has 4.5:1 (WCAG 2.2, 1.4.3)", (text, ground) => {
    expect(contrast(token(text)[theme], token(ground)[theme])).toBeGreaterThanOrEqual(4.5)
  })

  const markPairs = grounds.flatMap((ground) => [...states, "rule"].map((mark) => [mark, ground])) as [
    string,
    string,
  ][]
  test.each(markPairs)("mark %s on %s has 3:1 (WCAG 2.2, 1.4.11)", (mark, ground) => {
    expect(contrast(token(mark)[theme], token(ground)[theme])).toBeGreaterThanOrEqual(3)
  })
})
