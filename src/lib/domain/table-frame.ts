/** A table as it goes to the browser: numbers as they are stored, texts as codes into a dictionary. */
export interface FramedColumn {
  readonly name: string
  readonly unit: string | null
  readonly symbol: string | null
  readonly values: Float64Array | readonly string[]
}
export interface FramedTable {
  readonly rows: number
  readonly columns: readonly FramedColumn[]
}

interface Header {
  readonly rows: number
  readonly columns: readonly {
    readonly name: string
    readonly unit: string | null
    readonly symbol: string | null
    /** Distinct texts of a text column; absent for numbers. */
    readonly texts?: readonly string[]
  }[]
}

/**
 * One binary frame: uint32 length of a JSON header, the header padded with blanks to a multiple of 8, then each column:
 * numbers as little-endian doubles (NaN where missing), texts as little-endian uint32 codes padded to a multiple of 8.
 */
export function writeTableFrame({ rows, columns }: FramedTable): Uint8Array {
  const coded = columns.map(({ name, unit, symbol, values }) => {
    if (values instanceof Float64Array)
      return {
        header: { name, unit, symbol },
        bytes: new Uint8Array(values.buffer, values.byteOffset, values.byteLength),
      }
    const codes = new Map<string, number>()
    const column = Uint32Array.from(values, (text) => {
      const code = codes.get(text) ?? codes.size
      codes.set(text, code)
      return code
    })
    return { header: { name, unit, symbol, texts: [...codes.keys()] }, bytes: new Uint8Array(column.buffer) }
  })
  const json = JSON.stringify({ rows, columns: coded.map(({ header }) => header) } satisfies Header)
  const header = new TextEncoder().encode(json)
  const headerLength = padded(header.length + 4) - 4
  const total = coded.reduce((sum, { bytes }) => sum + padded(bytes.length), headerLength + 4)
  const frame = new Uint8Array(total)
  new DataView(frame.buffer).setUint32(0, headerLength, true)
  frame.fill(32, 4, headerLength + 4)
  frame.set(header, 4)
  let at = headerLength + 4
  for (const { bytes } of coded) {
    frame.set(bytes, at)
    at += padded(bytes.length)
  }
  return frame
}

const padded = (length: number) => Math.ceil(length / 8) * 8

/** Reads a frame back. @throws RangeError when it is shorter than its header says */
export function readTableFrame(buffer: ArrayBuffer): FramedTable {
  const headerLength = new DataView(buffer).getUint32(0, true)
  const header = JSON.parse(new TextDecoder().decode(new Uint8Array(buffer, 4, headerLength))) as Header
  let at = headerLength + 4
  const columns = header.columns.map(({ texts, ...column }) => {
    const from = at
    at += padded(header.rows * (texts ? 4 : 8))
    if (at > buffer.byteLength) throw new RangeError(`The table is cut off in column ${column.name}.`)
    const values = texts
      ? Array.from(new Uint32Array(buffer, from, header.rows), (code) => texts[code]!)
      : new Float64Array(buffer, from, header.rows)
    return { ...column, values }
  })
  return { rows: header.rows, columns }
}
