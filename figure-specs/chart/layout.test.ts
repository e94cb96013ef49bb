import * as vega from "vega"
import { describe, expect, test } from "vitest"
import { axisTexts, frameShape } from "./axis-shapes"
import type { AxisDrawing, Frame } from "./drawing"
import { freePlace, inkInside } from "./free-place"
import { labelParts } from "./label-parts"
import { defaultLook } from "./look"
import { lookPatch, patchLook } from "./look-patch"
import { markerPath } from "./markers"
import { fractionAlong } from "./position"
import { textCorners, type TextShape } from "./shape"
import { placeSlopeGuide } from "./slope-guide"
import { thinPoints } from "./thin-points"
import { tint } from "./tint"

const logAxis: AxisDrawing = {
  title: "x",
  scale: "log",
  domain: [1, 1000],
  major: [1, 10, 100, 1000].map((value) => ({ value, label: String(value) })),
  minor: [2, 5, 20, 50, 200, 500],
}
const measure = (text: string) => ({ widthEm: 0.5 * text.length, heightEm: 0.74, depthEm: 0.21 })

interface VegaScale {
  (value: number): number
  domain(ends: readonly number[]): VegaScale
  range(ends: readonly number[]): VegaScale
}

describe("positions", () => {
  // Vega draws the data and this layout the ticks: both must map a value to the same place.
  test.each([
    ["log", [0.3, 4000], [0.5, 1, 77, 3999]],
    ["linear", [-3, 12], [-3, 0, 4.4, 12]],
    ["symlog", [-100, 50], [-80, -0.1, 0, 3, 50]],
  ] as const)("%s axes agree with Vega's scales", (type, domain, values) => {
    const create = vega.scale(type) as unknown as () => VegaScale
    const scale = create()
      .domain([...domain])
      .range([0, 1])
    for (const value of values)
      expect(fractionAlong({ scale: type, domain: [...domain], symlogConstant: 1 }, value)).toBeCloseTo(
        scale(value),
        12,
      )
  })
})

describe("axes", () => {
  const frame: Frame = { widthPt: 300, heightPt: 200, look: defaultLook }

  test("ticks point inwards on four sides and none sits on a corner", () => {
    const shape = frameShape({ x: logAxis, y: logAxis }, frame, defaultLook)
    const d = shape.type === "path" ? shape.d : ""
    expect(d.startsWith("M0,0H300V200H0Z")).toBe(true)
    expect(d.match(/M100,200v-3\.4/g)).toHaveLength(1)
    expect(d.match(/M100,0v3\.4/g)).toHaveLength(1)
    expect(d.match(/M300,[\d.]+h-3\.4/g)).toHaveLength(2)
    expect(d).not.toMatch(/M300,200v|M0,200v/)
  })

  test("numbers are centred under their ticks, the title under the numbers", () => {
    const texts = axisTexts(logAxis, "bottom", frame, defaultLook, measure)
    expect(texts.map(({ x }) => Math.round(x))).toEqual([0, 100, 200, 300, 150])
    const [number, title] = [texts[0]!, texts.at(-1)!]
    expect(title.y - measure("").heightEm * title.fontPt).toBeGreaterThan(number.y)
  })

  test("a rotated text's box is turned with it", () => {
    const place = { x: 10, y: 20, align: "left", baseline: "alphabetic", angle: -90 } as const
    const text: TextShape = {
      type: "text",
      text: "abcd",
      ...place,
      fontPt: 10,
      color: "#000000",
      bold: false,
    }
    const corners = textCorners(text, measure("abcd"))
    // Upwards from (10, 20): 20 long, 7.4 to the left of the baseline, 2.1 to its right.
    const expected = [
      [2.6, 20],
      [2.6, 0],
      [12.1, 0],
      [12.1, 20],
    ]
    corners.forEach(([x, y], k) => {
      expect(x).toBeCloseTo(expected[k]![0]!, 9)
      expect(y).toBeCloseTo(expected[k]![1]!, 9)
    })
  })
})

describe("free places", () => {
  const frame = { widthPt: 100, heightPt: 80 }
  const box = { widthPt: 30, heightPt: 20 }

  test("an empty frame gives the top right corner", () => {
    expect(freePlace([], frame, box, 5)).toMatchObject({ x: 65, y: 5, covered: 0 })
  })

  test("ink pushes the box into another corner", () => {
    const ink = Array.from({ length: 100 }, (_, k) => [k, 15] as const)
    expect(freePlace(ink, frame, box, 5)).toMatchObject({ x: 5, y: 55, covered: 0 })
  })

  test("ink in a turned box", () => {
    const diamond = [
      [0, -10],
      [10, 0],
      [0, 10],
      [-10, 0],
    ] as const
    expect(
      inkInside(
        [
          [0, 0],
          [9, 0],
          [8, 8],
          [-4, -4],
        ],
        diamond,
      ),
    ).toBe(3)
  })
})

describe("reference slopes", () => {
  test("a guide keeps its distance from the curve and has its slope", () => {
    const curves = Array.from({ length: 51 }, (_, k) => ({ x: 4 * k, y: 40 + 2 * k }))
    const guide = placeSlopeGuide(0.5, {
      widthPt: 200,
      heightPt: 160,
      curves,
      stretch: [50, 190],
      labelPt: 10,
      gapPt: 11,
    })!
    expect(guide.side).toBe("above")
    expect((guide.to.y - guide.from.y) / (guide.to.x - guide.from.x)).toBeCloseTo(0.5, 9)
    expect(40 + guide.from.x / 2 - guide.from.y).toBeCloseTo(11, 9)
  })

  test("without room there is none", () => {
    const around = { widthPt: 60, heightPt: 20, stretch: [0, 60] as const, labelPt: 10, gapPt: 11 }
    expect(placeSlopeGuide(0, { ...around, curves: [{ x: 30, y: 10 }] })).toBeNull()
  })
})

describe("markers", () => {
  const area = (path: string) => {
    const points = [...path.matchAll(/(-?[\d.]+),(-?[\d.]+)/g)].map(([, x, y]) => [Number(x), Number(y)])
    return Math.abs(
      points.reduce((sum, [x, y], k) => {
        const [nx, ny] = points[(k + 1) % points.length]!
        return sum + (x! * ny! - nx! * y!) / 2
      }, 0),
    )
  }
  test.each(["square", "triangle", "diamond", "triangle-down"] as const)(
    "a %s has the area of a circle",
    (name) => {
      // Within 12 %: more would make one series look heavier than another (common practice).
      expect(Math.abs(area(markerPath(name, 0, 0, 1)) / Math.PI - 1)).toBeLessThan(0.12)
    },
  )

  test("markers of a crowded curve are thinned to a distance", () => {
    const points = Array.from({ length: 10 }, (_, k) => ({ x: k, y: 0 }))
    expect(thinPoints(points, 3)).toEqual([0, 3, 6, 9])
  })
})

describe("colours", () => {
  test("a tint is the colour laid on white", () => {
    // 255 - (255 - c) / 4 for c = 0, 114, 178.
    expect(tint("#0072B2", 0.25)).toBe("#bfdcec")
  })
})

describe("labels", () => {
  test("text, TeX and powers of ten are told apart", () => {
    expect(labelParts("Time $t/\\tau$ in \\$")).toMatchObject([
      { type: "text", text: "Time " },
      { type: "math", tex: "t/\\tau", at: 6 },
      { type: "text", text: " in $" },
    ])
    expect(labelParts("$10^{-3}$")).toMatchObject([
      { text: "10", scale: 1 },
      { text: "\u22123", scale: 0.7 },
    ])
    expect(labelParts("$2\\times10^{4}$")).toMatchObject([{ text: "2\u2009×\u200910" }, { text: "4" }])
    expect(labelParts("$10^{n}$")).toMatchObject([{ type: "math", tex: "10^{n}" }])
  })

  test("an unclosed dollar is an error at its place", () => {
    expect(() => labelParts("ab $x")).toThrowError(
      expect.objectContaining({ code: "dollar-unclosed", column: 4 }),
    )
  })
})

describe("look settings", () => {
  test("what is on the list is taken over, null takes it back", () => {
    const patch = lookPatch.parse({
      fontPt: 8,
      palette: ["#112233"],
      letter: { bold: true },
      curveWidthPt: null,
    })
    expect(patchLook(defaultLook, patch)).toEqual({
      ...defaultLook,
      fontPt: 8,
      palette: ["#112233"],
      letter: { ...defaultLook.letter, bold: true },
    })
  })

  test.each([
    [{ encode: {} }],
    [{ fontPt: "8; url(x)" }],
    [{ palette: ["url(http://example.org)"] }],
    [{ fontFamily: "Comic" }],
    [{ fontPt: { signal: "1" } }],
    [{ curveWidthPt: 0 }],
  ])("%j is refused", (patch) => expect(lookPatch.safeParse(patch).success).toBe(false))
})
