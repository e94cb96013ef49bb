import type { IntakeLimits } from "../intake-limits"
import { IntakeRefusal } from "../intake-codes"
import type { TextEncodingName } from "../reading-recipe"
import { Utf8Check, asUtf8, encodingSign } from "./text-encoding"

/** What one quick pass over the bytes tells before the table is read. */
export interface TextSurvey {
  readonly encoding: TextEncodingName
  readonly mark: number
  readonly encodingGuessed: boolean
  /** Bytes before decoding. */
  readonly size: number
  /** Decoded beginning of the file, and whether that is all of it. */
  readonly head: string
  readonly complete: boolean
  /** Decoded pieces near the middle and at the end; they begin and may end within a line. */
  readonly middle: string
  readonly tail: string
}

const PIECE = 64 * 1024
const MOST_KEPT = 32

/**
 * Passes over a text once: decides the encoding, refuses zero bytes and keeps the samples that the decisions need. UTF-8
 * needs the whole file: one wrong byte at the end makes it windows-1252.
 *
 * @param headBytes how much of the beginning to keep
 * @throws IntakeRefusal empty-file, file-too-large, encoding-unknown, binary-in-text
 */
export async function surveyText(
  open: () => AsyncIterable<Uint8Array>,
  headBytes: number,
  limits: IntakeLimits,
  told: TextEncodingName | null = null,
): Promise<TextSurvey> {
  const utf8 = new Utf8Check()
  const head: Buffer[] = []
  let kept: { at: number; bytes: Buffer }[] = []
  let stride = PIECE
  let size = 0
  let tail = Buffer.alloc(0)
  let zeroAt = -1
  for await (const piece of open()) {
    utf8.add(piece)
    if (size < headBytes) head.push(Buffer.from(piece.subarray(0, headBytes - size)))
    if (zeroAt < 0) {
      const found = piece.indexOf(0)
      if (found >= 0) zeroAt = size + found
    }
    if (size >= (kept.at(-1)?.at ?? -stride) + stride) {
      // Even offsets keep the two bytes of a UTF-16 unit together.
      kept.push({ at: size, bytes: Buffer.from(piece.subarray(size % 2, PIECE)) })
      if (kept.length > MOST_KEPT) {
        kept = kept.filter((_, index) => index % 2 === 0)
        stride *= 2
      }
    }
    size += piece.length
    if (size > limits.maxBytes) throw new IntakeRefusal("file-too-large", { n: size, max: limits.maxBytes })
    tail = Buffer.concat([
      piece.length < PIECE ? tail : tail.subarray(0, 0),
      piece.subarray(-PIECE),
    ]).subarray(-PIECE)
  }
  if (size === 0) throw new IntakeRefusal("empty-file")
  const start = Buffer.concat(head)
  const sign = encodingSign(start.subarray(0, PIECE))
  const wide = (told ?? sign?.encoding)?.startsWith("utf-16")
  if (zeroAt >= 0 && !wide) throw await zeroByte(open, zeroAt)
  const eightBit = utf8.valid ? "utf-8" : "windows-1252"
  const encoding = told ?? (sign && sign.encoding !== "utf-8" ? sign.encoding : eightBit)
  const mark = sign?.mark ?? 0
  const decode = (bytes: Buffer) => new TextDecoder(encoding, { ignoreBOM: true }).decode(bytes)
  const middle = kept.find(({ at }) => at >= size / 2) ?? kept.at(-1)!
  return {
    encoding,
    mark,
    encodingGuessed: told === null && (encoding === "windows-1252" || (sign?.guessed ?? false)),
    size,
    head: decode(start.subarray(mark)),
    complete: size <= headBytes,
    middle: size <= headBytes ? "" : decode(middle.bytes),
    tail: size <= headBytes ? "" : decode(tail.subarray(wide ? tail.length % 2 : 0)),
  }
}

/** Where the first zero byte stands: line, and field if the line is split at commas, semicolons or tabs. */
async function zeroByte(open: () => AsyncIterable<Uint8Array>, zeroAt: number): Promise<IntakeRefusal> {
  let line = 1
  let field = 1
  let at = 0
  let previous = 0
  for await (const piece of asUtf8(open(), { encoding: "utf-8", mark: 0 })) {
    for (const byte of piece) {
      if (at++ === zeroAt) return new IntakeRefusal("binary-in-text", { line }, line, field)
      if (byte === 10 ? previous !== 13 : byte === 13) {
        line++
        field = 1
      } else if (byte === 44 || byte === 59 || byte === 9) field++
      previous = byte
    }
  }
  return new IntakeRefusal("binary-in-text", { line }, line, field)
}
