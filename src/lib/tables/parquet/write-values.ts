import type { DecodedArray } from "hyparquet"
import { ArrayFailure, numberWriter, textWriter } from "../arrays/array-source"
import { byteText } from "../arrays/decode-elements"
import type { ColumnWriter, NumberWriter } from "../columns/column-writer"
import { type ParquetValues, isoDate, isoTimestamp } from "./parquet-column"

/** Writes decoded values; null is missing, NaN is a value. */
export async function writeValues(
  values: ParquetValues,
  data: DecodedArray,
  writers: readonly ColumnWriter[],
): Promise<void> {
  const list = data as ArrayLike<unknown>
  switch (values.as) {
    case "text":
      return textWriter(writers[0]).write(Array.from(list, textOf))
    case "date":
      return textWriter(writers[0]).write(
        Array.from(list, (days) => (days == null ? null : isoDate(Number(days)))),
      )
    case "timestamp": {
      const { digits, utc } = values
      const iso = (ticks: unknown) => (ticks == null ? null : isoTimestamp(ticks as bigint, digits, utc))
      return textWriter(writers[0]).write(Array.from(list, iso))
    }
    case "decimal":
      checkDecimals(list, values)
      return writeNumbers(list, numberWriter(writers[0]))
    case "complex":
      for (const [index, part] of values.parts.entries())
        await writeNumbers(
          Array.from(list, (value) => (value as Record<string, unknown> | null | undefined)?.[part]),
          numberWriter(writers[index]),
        )
      return
    default:
      return writeNumbers(list, numberWriter(writers[0]))
  }
}

/** The library rounds a decimal of more than 53 bits; such a column is not read. */
function checkDecimals(
  list: ArrayLike<unknown>,
  { scale, precision }: { scale: number; precision: number },
): void {
  const most = 2 ** 53 / 10 ** scale
  for (let index = 0; index < list.length; index++)
    if (Math.abs(Number(list[index] ?? 0)) >= most)
      throw new ArrayFailure("decimal-precision", { n: precision })
}

function textOf(value: unknown): string | null {
  if (value == null) return null
  return value instanceof Uint8Array ? byteText(value) : String(value)
}

async function writeNumbers(list: ArrayLike<unknown>, writer: NumberWriter): Promise<void> {
  if (list instanceof Float64Array) return writer.write(list)
  let nulls = false
  const numbers = Float64Array.from(list, (value) => {
    if (value == null) nulls = true
    if (typeof value === "bigint") return writer.integer(value)
    if (typeof value === "boolean") return value ? 1 : 0
    return typeof value === "number" ? value : NaN
  })
  await writer.write(numbers, nulls ? (index) => list[index] == null : undefined)
}
