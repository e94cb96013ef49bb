/** A table as it goes to the browser: numbers as they are stored, texts as codes into a dictionary. */
export interface FramedTable {
  readonly rows: number
  readonly columns: readonly (FrameColumn & { readonly values: Float64Array | readonly string[] })[]
}

export interface FrameColumn {
  readonly name: string
  readonly unit: string | null
  /** TeX without dollar signs. */
  readonly symbol: string | null
}

/** A column on its way out: `texts`, its distinct values, makes it a text column; `parts` are its bytes in order. */
export interface OutgoingColumn extends FrameColumn {
  readonly texts?: readonly string[]
  readonly parts: AsyncIterable<Uint8Array> | Iterable<Uint8Array>
}

interface Header {
  readonly rows: number
  readonly columns: readonly (FrameColumn & { readonly texts?: readonly string[] })[]
}

const padded = (length: number) => Math.ceil(length / 8) * 8
const bytesOf = (rows: number, isText: boolean) => padded(rows * (isText ? 4 : 8))

function headerOf(rows: number, columns: readonly OutgoingColumn[]): Uint8Array {
  const header: Header = {
    rows,
    columns: columns.map(({ name, unit, symbol, texts }) => ({
      name,
      unit,
      symbol,
      ...(texts ? { texts } : {}),
    })),
  }
  const json = new TextEncoder().encode(JSON.stringify(header))
  const bytes = new Uint8Array(padded(json.length + 4)).fill(32)
  new DataView(bytes.buffer).setUint32(0, bytes.length - 4, true)
  bytes.set(json, 4)
  return bytes
}

/**
 * One binary frame: uint32 length of a JSON header, the header padded with blanks to a multiple of 8, then each column:
 * numbers as little-endian doubles (NaN where missing), texts as little-endian uint32 codes padded to a multiple of 8.
 *
 * @returns its length in bytes and its bytes piece by piece
 */
export function writeTableFrame(rows: number, columns: readonly OutgoingColumn[]) {
  const header = headerOf(rows, columns)
  const length = columns.reduce((sum, { texts }) => sum + bytesOf(rows, texts !== undefined), header.length)
  async function* pieces(): AsyncGenerator<Uint8Array> {
    yield header
    for (const { parts, texts } of columns) {
      yield* parts
      if (texts && rows % 2 === 1) yield new Uint8Array(4)
    }
  }
  return { length, pieces: pieces() }
}

/** Reads a frame back. @throws RangeError when it is shorter than its header says */
export function readTableFrame(buffer: ArrayBuffer): FramedTable {
  const headerLength = new DataView(buffer).getUint32(0, true)
  const header = JSON.parse(new TextDecoder().decode(new Uint8Array(buffer, 4, headerLength))) as Header
  let at = headerLength + 4
  const columns = header.columns.map(({ texts, ...column }) => {
    const from = at
    at += bytesOf(header.rows, texts !== undefined)
    if (at > buffer.byteLength) throw new RangeError(`The table is cut off in column ${column.name}.`)
    const values = texts
      ? Array.from(new Uint32Array(buffer, from, header.rows), (code) => texts[code]!)
      : new Float64Array(buffer, from, header.rows)
    return { ...column, values }
  })
  return { rows: header.rows, columns }
}
