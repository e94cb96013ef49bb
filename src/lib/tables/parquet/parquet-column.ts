import type { SchemaTree } from "hyparquet"
import type { IntakeCodeName, SentenceValues } from "../intake-codes"
import type { ColumnKind } from "../table-reading"

/** How the values of a Parquet column are turned into ours. */
export type ParquetValues =
  | { readonly as: "number" | "boolean" | "text" | "date" }
  | { readonly as: "timestamp"; readonly digits: 3 | 6 | 9; readonly utc: boolean }
  | { readonly as: "decimal"; readonly scale: number; readonly precision: number }
  | { readonly as: "complex"; readonly parts: readonly [string, string] }

export interface ParquetColumn {
  readonly name: string
  readonly values: ParquetValues
}

export interface ParquetRefusal {
  readonly name: string
  readonly code: IntakeCodeName
  readonly about: SentenceValues
}

/** What becomes of a column at the top of the schema; nested columns are read only when they are complex numbers. */
export function parquetColumn({ element, children }: SchemaTree): ParquetColumn | ParquetRefusal {
  const { name } = element
  const refuse = (type: string): ParquetRefusal => ({ name, code: "parquet-type", about: { type } })
  const { type, converted_type: converted, logical_type: logical } = element
  const told = logical?.type ?? converted
  if (children.length > 0) {
    const parts = complexParts(children)
    return parts && element.repetition_type !== "REPEATED"
      ? { name, values: { as: "complex", parts } }
      : refuse(told ?? "STRUCT")
  }
  if (element.repetition_type === "REPEATED") return refuse("LIST")
  const found = valuesOf(element)
  if (found) return { name, values: found }
  return refuse(told ?? type ?? "unknown")
}

function valuesOf(element: SchemaTree["element"]): ParquetValues | null {
  const { type, converted_type: converted, logical_type: logical } = element
  const told = logical?.type ?? converted
  if (type === "BOOLEAN") return { as: "boolean" }
  if (type === "INT96") return { as: "timestamp", digits: 9, utc: false }
  if (told === "DECIMAL" && (type === "INT32" || type === "INT64" || type?.endsWith("BYTE_ARRAY")))
    return { as: "decimal", scale: element.scale ?? 0, precision: element.precision ?? 0 }
  if (told === "DATE") return { as: "date" }
  if (logical?.type === "TIMESTAMP") {
    const digits = ({ MILLIS: 3, MICROS: 6, NANOS: 9 } as const)[logical.unit]
    return { as: "timestamp", digits, utc: logical.isAdjustedToUTC }
  }
  if (converted === "TIMESTAMP_MILLIS") return { as: "timestamp", digits: 3, utc: false }
  if (converted === "TIMESTAMP_MICROS") return { as: "timestamp", digits: 6, utc: false }
  if (["UTF8", "STRING", "ENUM", "UUID"].includes(told ?? "")) return { as: "text" }
  const plain = told === undefined || told === "INTEGER" || told === "FLOAT16" || /^U?INT_/.test(told)
  if (plain && (told === "FLOAT16" || ["INT32", "INT64", "FLOAT", "DOUBLE"].includes(type ?? "")))
    return { as: "number" }
  return null
}

function complexParts(children: readonly SchemaTree[]): [string, string] | null {
  const names = children.map(({ element }) => element.name)
  const floats = children.every(
    ({ element, children: inner }) =>
      inner.length === 0 &&
      element.repetition_type !== "REPEATED" &&
      (element.type === "DOUBLE" || element.type === "FLOAT"),
  )
  const known = [
    ["re", "im"],
    ["real", "imag"],
  ] as const
  const pair = known.find(([re, im]) => names.length === 2 && names[0] === re && names[1] === im)
  return floats && pair ? [...pair] : null
}

export const kindOf = ({ as }: ParquetValues): ColumnKind =>
  as === "boolean" || as === "text" ? as : as === "date" || as === "timestamp" ? "datetime" : "number"

/**
 * A count of 10^-digits seconds since 1970 as ISO 8601, with every digit that the file has.
 *
 * @example isoTimestamp(1_000_001n, 6, false) // "1970-01-01T00:00:01.000001"
 */
export function isoTimestamp(ticks: bigint, digits: 3 | 6 | 9, utc: boolean): string {
  const perSecond = 10n ** BigInt(digits)
  const fraction = ((ticks % perSecond) + perSecond) % perSecond
  const seconds = (ticks - fraction) / perSecond
  const date = new Date(Number(seconds) * 1000)
  if (Number.isNaN(date.getTime())) return String(ticks)
  return `${date.toISOString().slice(0, -5)}.${String(fraction).padStart(digits, "0")}${utc ? "Z" : ""}`
}

/** Days since 1970 as ISO 8601. */
export function isoDate(days: number): string {
  const date = new Date(days * 86_400_000)
  return Number.isNaN(date.getTime()) ? String(days) : date.toISOString().slice(0, -14)
}
