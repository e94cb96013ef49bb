import { zlibSync } from "fflate"
import { channelsOf } from "./tint"

const crcTable = Uint32Array.from({ length: 256 }, (_, n) => {
  let c = n
  for (let k = 0; k < 8; k += 1) c = c & 1 ? 0xedb88320 ^ (c >>> 1) : c >>> 1
  return c >>> 0
})

/** CRC-32 of ISO 3309. @see PNG specification, annex D */
export function crc32(bytes: Uint8Array): number {
  let crc = 0xffffffff
  for (const byte of bytes) crc = crcTable[(crc ^ byte) & 0xff]! ^ (crc >>> 8)
  return (crc ^ 0xffffffff) >>> 0
}

function chunk(type: string, data: Uint8Array): Uint8Array {
  const out = new Uint8Array(12 + data.length)
  const view = new DataView(out.buffer)
  view.setUint32(0, data.length)
  for (let k = 0; k < 4; k += 1) out[4 + k] = type.charCodeAt(k)
  out.set(data, 8)
  view.setUint32(8 + data.length, crc32(out.subarray(4, 8 + data.length)))
  return out
}

/**
 * A picture of at most 256 colours as PNG, one byte a pixel. Smaller and faster than true colour, and exact: a map has
 * as many colours as its scale.
 *
 * @param pixels places in the palette, row by row from the top
 * @see PNG specification, third edition (2025)
 */
export function indexedPng(
  pixels: Uint8Array,
  width: number,
  height: number,
  palette: readonly string[],
): Uint8Array {
  const header = new Uint8Array(13)
  const view = new DataView(header.buffer)
  view.setUint32(0, width)
  view.setUint32(4, height)
  // 8 bits a pixel, colour type 3: palette.
  header.set([8, 3], 8)
  const rows = new Uint8Array(height * (width + 1))
  for (let row = 0; row < height; row += 1)
    rows.set(pixels.subarray(row * width, (row + 1) * width), row * (width + 1) + 1)
  const parts = [
    Uint8Array.of(137, 80, 78, 71, 13, 10, 26, 10),
    chunk("IHDR", header),
    chunk("PLTE", Uint8Array.from(palette.flatMap(channelsOf))),
    chunk("IDAT", zlibSync(rows, { level: 9 })),
    chunk("IEND", new Uint8Array(0)),
  ]
  const png = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0))
  let at = 0
  for (const part of parts) {
    png.set(part, at)
    at += part.length
  }
  return png
}

/** Bytes as a PNG data address. */
export function pngAddress(png: Uint8Array): string {
  let binary = ""
  for (let start = 0; start < png.length; start += 0x8000)
    binary += String.fromCharCode(...png.subarray(start, start + 0x8000))
  return `data:image/png;base64,${btoa(binary)}`
}
