import fc from "fast-check"
import { expect, test } from "vitest"
import { firstDifferentByte } from "./check-archive"

async function* inPieces(bytes: Uint8Array, size: number): AsyncGenerator<Uint8Array> {
  for (let at = 0; at < bytes.length; at += size) yield bytes.subarray(at, at + size)
}

test("property: the first different byte is found however the streams are cut", async () => {
  const size = fc.integer({ min: 1, max: 9 })
  await fc.assert(
    fc.asyncProperty(
      fc.uint8Array({ min: 0, max: 3, maxLength: 40 }),
      fc.uint8Array({ min: 0, max: 3, maxLength: 40 }),
      size,
      size,
      async (a, b, cutA, cutB) => {
        const at = [...a].findIndex((byte, index) => byte !== b[index])
        const expected = at >= 0 ? at : a.length === b.length ? null : Math.min(a.length, b.length)
        expect(await firstDifferentByte(inPieces(a, cutA), inPieces(b, cutB))).toBe(expected)
        expect(await firstDifferentByte(inPieces(a, cutA), inPieces(a, cutB))).toBeNull()
      },
    ),
  )
})
