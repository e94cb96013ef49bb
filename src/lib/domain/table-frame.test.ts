import fc from "fast-check"
import { expect, test } from "vitest"
import { type OutgoingColumn, readTableFrame, writeTableFrame } from "./table-frame"

async function framed(rows: number, columns: readonly OutgoingColumn[]): Promise<ArrayBuffer> {
  const { length, pieces } = writeTableFrame(rows, columns)
  const frame = new Uint8Array(length)
  let at = 0
  for await (const piece of pieces) {
    frame.set(piece, at)
    at += piece.length
  }
  expect(at).toBe(length)
  return frame.buffer
}
const bytes = (array: Float64Array | Uint32Array) => new Uint8Array(array.buffer)

test("property: a table comes back as it went, bit for bit", async () => {
  const threeOf = <T>(value: fc.Arbitrary<T>) => fc.array(value, { minLength: 3, maxLength: 3 })
  await fc.assert(
    fc.asyncProperty(threeOf(fc.double()), threeOf(fc.nat(1)), fc.string(), async (numbers, codes, name) => {
      const values = Float64Array.from(numbers)
      const texts = ["", name]
      const plain = { unit: "1/J", symbol: null }
      const frame = await framed(3, [
        { ...plain, name, texts, parts: [bytes(Uint32Array.from(codes))] },
        { ...plain, name: "x", parts: [bytes(values).slice(0, 8), bytes(values).slice(8)] },
      ])
      expect(readTableFrame(frame)).toEqual({
        rows: 3,
        columns: [
          { ...plain, name, values: codes.map((code) => texts[code]) },
          { ...plain, name: "x", values },
        ],
      })
    }),
  )
})

test("a frame that is cut off is refused", async () => {
  const parts = [bytes(Float64Array.of(1, 2))]
  const frame = await framed(2, [{ name: "x", unit: null, symbol: null, parts }])
  expect(() => readTableFrame(frame.slice(0, -8))).toThrow(/cut off/)
})
