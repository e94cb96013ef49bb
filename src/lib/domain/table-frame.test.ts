import fc from "fast-check"
import { expect, test } from "vitest"
import { readTableFrame, writeTableFrame } from "./table-frame"

test("property: a table comes back as it went, bit for bit", () => {
  const column = fc.array(fc.double(), { minLength: 3, maxLength: 3 })
  fc.assert(
    fc.property(
      column,
      fc.array(fc.string(), { minLength: 3, maxLength: 3 }),
      fc.string(),
      (numbers, texts, name) => {
        const table = {
          rows: 3,
          columns: [
            { name, unit: null, symbol: "n", values: texts },
            { name: "x", unit: "1/J", symbol: null, values: Float64Array.from(numbers) },
          ],
        }
        expect(readTableFrame(writeTableFrame(table).buffer as ArrayBuffer)).toEqual(table)
      },
    ),
  )
})

test("a frame that is cut off is refused", () => {
  const frame = writeTableFrame({
    rows: 2,
    columns: [{ name: "x", unit: null, symbol: null, values: Float64Array.of(1, 2) }],
  })
  expect(() => readTableFrame(frame.slice(0, -8).buffer)).toThrow(/cut off/)
})
