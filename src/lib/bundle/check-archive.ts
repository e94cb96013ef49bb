import { createReadStream } from "node:fs"
import type { AddItem } from "./check-bag"
import type { BundleContent, RecordedSoftware } from "./draft-record"
import { writeBundle } from "./write-bag"

/**
 * Where two streams of bytes differ first; null when they are the same.
 *
 * @returns the offset, which is the shorter length when one is the beginning of the other
 */
export async function firstDifferentByte(
  a: AsyncIterable<Uint8Array>,
  b: AsyncIterable<Uint8Array>,
): Promise<number | null> {
  const sides = [a, b].map((side) => ({
    pieces: side[Symbol.asyncIterator](),
    rest: new Uint8Array(0) as Uint8Array,
    done: false,
  }))
  let offset = 0
  for (;;) {
    for (const side of sides)
      while (side.rest.length === 0 && !side.done) {
        const { done, value } = await side.pieces.next()
        if (done) side.done = true
        else side.rest = value
      }
    const [left, right] = sides as [(typeof sides)[0], (typeof sides)[0]]
    const length = Math.min(left.rest.length, right.rest.length)
    if (length === 0) return left.done && right.done ? null : offset
    if (Buffer.compare(left.rest.subarray(0, length), right.rest.subarray(0, length)) !== 0) {
      let at = 0
      while (left.rest[at] === right.rest[at]) at += 1
      return offset + at
    }
    offset += length
    for (const side of sides) side.rest = side.rest.subarray(length)
  }
}

/** Packs the bundle again: no byte between or around its files may differ from what the product writes. */
export async function checkArchive(
  zip: string,
  content: BundleContent,
  software: RecordedSoftware,
  isOwnBundle: boolean,
  add: AddItem,
): Promise<void> {
  const isOwnPacking = isOwnBundle && content.software.zlib === software.zlib
  const difference = await firstDifferentByte(createReadStream(zip), writeBundle(content))
  if (difference === null) add("archive", "holds", "packed again, the same bytes")
  else if (isOwnPacking)
    add("archive", "fails", `byte ${difference} is not what the product writes for these files`)
  else
    add("archive", "not-compared", "packed by other software; the checksums of the files inside are compared")
}
