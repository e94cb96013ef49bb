import { isUtf8 } from "node:buffer"
import { IntakeRefusal } from "../intake-codes"
import type { TextEncodingName } from "../reading-recipe"

export interface EncodingSign {
  readonly encoding: TextEncodingName
  /** Bytes of the byte order mark. */
  readonly mark: number
  readonly guessed: boolean
}

/**
 * What the first 64 KiB say: a byte order mark, or the zero bytes of UTF-16 written without one. Null when only the
 * whole file can tell.
 *
 * @throws IntakeRefusal encoding-unknown for UTF-32
 */
export function encodingSign(head: Uint8Array): EncodingSign | null {
  const [a, b, c, d] = head
  if (a === 0xef && b === 0xbb && c === 0xbf) return { encoding: "utf-8", mark: 3, guessed: false }
  if ((a === 0xff && b === 0xfe && c === 0 && d === 0) || (a === 0 && b === 0 && c === 0xfe && d === 0xff))
    throw new IntakeRefusal("encoding-unknown")
  if (a === 0xff && b === 0xfe) return { encoding: "utf-16le", mark: 2, guessed: false }
  if (a === 0xfe && b === 0xff) return { encoding: "utf-16be", mark: 2, guessed: false }
  const zeros = [0, 0]
  for (let at = 0; at < head.length; at++) if (head[at] === 0) zeros[at & 1]!++
  const [even, odd] = zeros.map((count) => count / (head.length / 2)) as [number, number]
  if (odd >= 0.3 && even <= 0.01) return { encoding: "utf-16le", mark: 0, guessed: true }
  if (even >= 0.3 && odd <= 0.01) return { encoding: "utf-16be", mark: 0, guessed: true }
  return null
}

/** Decides piece by piece whether a stream is valid UTF-8; a character may lie across two pieces. */
export class Utf8Check {
  #left = new Uint8Array(0)
  #valid = true

  add(piece: Uint8Array): void {
    if (!this.#valid) return
    let start = 0
    if (this.#left.length > 0) {
      // Complete the character that was cut: at most three bytes more.
      while (start < 3 && start < piece.length && (piece[start]! & 0xc0) === 0x80) start++
      const joined = Buffer.concat([this.#left, piece.subarray(0, start)])
      if (start === piece.length && unfinished(joined) > 0) {
        this.#left = joined
        return
      }
      this.#valid = isUtf8(joined)
    }
    const open = unfinished(piece.subarray(start))
    this.#left = Uint8Array.from(piece.subarray(piece.length - open))
    this.#valid &&= isUtf8(piece.subarray(start, piece.length - open))
  }

  /** Call after the last piece. */
  get valid(): boolean {
    return this.#valid && this.#left.length === 0
  }
}

/** Bytes at the end that begin a character without finishing it. */
function unfinished(bytes: Uint8Array): number {
  for (let back = 1; back <= Math.min(3, bytes.length); back++) {
    const byte = bytes[bytes.length - back]!
    if ((byte & 0xc0) === 0x80) continue
    const length = byte >= 0xf0 ? 4 : byte >= 0xe0 ? 3 : byte >= 0xc0 ? 2 : 1
    return length > back ? back : 0
  }
  return 0
}

/** A stream in another encoding as UTF-8, without its byte order mark. */
export async function* asUtf8(
  pieces: AsyncIterable<Uint8Array>,
  { encoding, mark }: Pick<EncodingSign, "encoding" | "mark">,
): AsyncIterable<Uint8Array> {
  const decoder = encoding === "utf-8" ? null : new TextDecoder(encoding, { ignoreBOM: true })
  let skip = mark
  for await (const piece of pieces) {
    const rest = piece.subarray(Math.min(skip, piece.length))
    skip -= piece.length - rest.length
    if (rest.length === 0) continue
    yield decoder ? Buffer.from(decoder.decode(rest, { stream: true })) : rest
  }
  const last = decoder?.decode()
  if (last) yield Buffer.from(last)
}
