import sharp from "sharp"
import { describe, expect, test } from "vitest"
import { colorSteps } from "./color-map"
import { simulateColorVision, type ColorVision } from "./color-vision"
import { colorBarOf, heatImage } from "./heat-map"
import { crc32 } from "./indexed-png"
import { indistinctSeries } from "./indistinct-series"
import { defaultLook } from "./look"
import { symlogTicks } from "./symlog-ticks"

async function pixelsOf(address: string) {
  const png = Buffer.from(address.replace("data:image/png;base64,", ""), "base64")
  const { data, info } = await sharp(png).removeAlpha().raw().toBuffer({ resolveWithObject: true })
  const at = (x: number, y: number) =>
    `#${[...data.subarray(3 * (y * info.width + x), 3 * (y * info.width + x) + 3)].map((c) => c.toString(16).padStart(2, "0")).join("")}`
  return { ...info, at }
}

describe("heat maps", () => {
  const scale = { scale: "linear", domain: [0, 1] } as const

  test("CRC-32 of “123456789” is CBF43926", () => {
    // The check value of this CRC in the catalogue of parametrised CRC algorithms (from memory).
    expect(crc32(new TextEncoder().encode("123456789"))).toBe(0xcbf43926)
  })

  test("ends of the maps are the published colours", () => {
    // First and last colour of viridis and cividis in their authors' tables (from memory).
    expect([colorSteps("viridis", 9).at(0), colorSteps("viridis", 9).at(-1)]).toEqual(["#440154", "#fde725"])
    expect(colorSteps("cividis", 2)).toHaveLength(2)
    const [below, , above] = colorSteps("RdBu", 3)
    // Blue below, red above.
    expect(parseInt(below!.slice(5), 16)).toBeGreaterThan(parseInt(below!.slice(1, 3), 16))
    expect(parseInt(above!.slice(1, 3), 16)).toBeGreaterThan(parseInt(above!.slice(5), 16))
  })

  test("the first row of the field is at the foot of the image, cells are hard-edged and missing ones grey", async () => {
    const field = { values: [0, 1, NaN, 0.5], columns: 2, rows: 2 }
    const { width, height, at } = await pixelsOf(
      heatImage(field, scale, defaultLook, { widthPt: 12, heightPt: 6 }),
    )
    // 12 pt and 6 pt at 600 dpi are 100 and 50 pixels, in two cells each.
    expect([width, height]).toEqual([100, 50])
    const colors = colorSteps("viridis", 255)
    expect([at(0, 49), at(49, 25)]).toEqual([colors[0], colors[0]])
    expect([at(50, 49), at(99, 25)]).toEqual([colors[254], colors[254]])
    expect([at(0, 0), at(99, 0)]).toEqual(["#bfbfbf", colors[127]])
  })

  test("values beyond the scale take its end colours, what a logarithm cannot show is missing", async () => {
    const log = { scale: "log", domain: [0.01, 1] } as const
    const field = { values: [-1, 0.001, 0.1, 5], columns: 4, rows: 1 }
    const { at, width } = await pixelsOf(heatImage(field, log, defaultLook, { widthPt: 12, heightPt: 3 }))
    const colors = colorSteps("viridis", 255)
    const cells = [0, 1, 2, 3].map((cell) => at(Math.floor(((cell + 0.5) * width) / 4), 0))
    expect(cells).toEqual(["#bfbfbf", colors[0], colors[127], colors[254]])
  })

  test("a colour bar has the ticks of its scale", () => {
    const bar = colorBarOf("$\\rho$", { scale: "log", domain: [0.001, 1] }, 100, defaultLook)
    expect(bar.axis.major.map(({ label }) => label)).toContain("$10^{-2}$")
    expect(symlogTicks([-1000, 50], 10).major.map(({ value }) => value)).toEqual([-1000, -100, -10, 0, 10])
  })
})

describe("colour vision", () => {
  const seen = (color: readonly number[], vision: ColorVision) => {
    const pixels = Uint8Array.from(color)
    simulateColorVision(pixels, vision)
    return [...pixels]
  }

  test.each(["protanopia", "deuteranopia", "tritanopia", "grey"] as const)(
    "%s leaves grey as it is",
    (vision) => {
      for (const grey of [0, 77, 128, 255])
        for (const channel of seen([grey, grey, grey], vision))
          expect(Math.abs(channel - grey)).toBeLessThan(2)
    },
  )

  test("pure red in grey has the luminance 0.2126, which is 127 of 255 in sRGB", () => {
    // BT.709 and IEC 61966-2-1: 1.055 x 0.2126^(1/2.4) - 0.055 = 0.4984.
    expect(seen([255, 0, 0], "grey")).toEqual([127, 127, 127])
  })

  test("red and green come closer without long-wave cones than with them", () => {
    const distance = (a: readonly number[], b: readonly number[]) => Math.hypot(...a.map((v, k) => v - b[k]!))
    const [red, green] = [
      [213, 94, 0],
      [120, 140, 0],
    ] as const
    expect(distance(seen(red, "protanopia"), seen(green, "protanopia"))).toBeLessThan(
      0.6 * distance(red, green),
    )
  })
})

test("series that share marker and dash are told", () => {
  const entry = (label: string, marker: "circle" | "square", dash: number[]) =>
    ({ label, marker, dash, color: "#000000", widthPt: 1 }) as const
  const entries = [entry("a", "circle", []), entry("b", "square", []), entry("c", "circle", [])]
  expect(indistinctSeries(entries).map(([one, other]) => [one.label, other.label])).toEqual([["a", "c"]])
})
