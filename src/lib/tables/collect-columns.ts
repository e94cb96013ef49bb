import { type ColumnChunk, type ColumnSink, isValid } from "./column-chunk"
import type { ColumnDescription } from "./table-reading"

/** A whole column in memory: numbers with NaN where missing, texts with "" where missing. */
export interface CollectedColumn {
  readonly name: string
  readonly unit: string | null
  readonly symbol: string | null
  readonly values: Float64Array | readonly string[]
}

/** A sink that keeps whole columns in memory, for tables that a computation reads at once. */
export function collectColumns(): {
  readonly sink: ColumnSink
  readonly columns: () => readonly CollectedColumn[]
} {
  let described: readonly ColumnDescription[] = []
  let numbers: Float64Array[][] = []
  let texts: string[][] = []
  const decoder = new TextDecoder()
  const take = (index: number, data: ColumnChunk) => {
    if (data.kind === "number") {
      const values = data.values.slice(0, data.rows)
      if (data.valid)
        for (let row = 0; row < data.rows; row += 1) if (!isValid(data.valid, row)) values[row] = Number.NaN
      numbers[index]!.push(values)
      return
    }
    for (let row = 0; row < data.rows; row += 1)
      texts[index]!.push(
        isValid(data.valid, row)
          ? decoder.decode(data.bytes.subarray(data.offsets[row], data.offsets[row + 1]))
          : "",
      )
  }
  return {
    sink: {
      start(columns) {
        described = columns
        numbers = columns.map(() => [])
        texts = columns.map(() => [])
      },
      chunk: (index, _part, data) => take(index, data),
    },
    columns: () =>
      described.map(({ name, unit, symbol, kind, index }) => ({
        name,
        unit: unit || null,
        symbol,
        values: kind === "number" || kind === "boolean" ? joined(numbers[index]!) : texts[index]!,
      })),
  }
}

function joined(parts: readonly Float64Array[]): Float64Array {
  const whole = new Float64Array(parts.reduce((sum, part) => sum + part.length, 0))
  let at = 0
  for (const part of parts) {
    whole.set(part, at)
    at += part.length
  }
  return whole
}
