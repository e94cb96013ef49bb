import type { Cell } from "../numbers/read-cell"

/** How the cells of a field are stored; complex takes two columns. */
export type FieldKind = "number" | "complex" | "boolean" | "datetime" | "text"

/** How many cells of a field read as what. Missing cells are not counted. */
export interface KindCounts {
  numbers: number
  complex: number
  booleans: number
  datetimes: number
  /** Would be numbers but for their print: overflow stars, digit groups, out of range. */
  spoiled: number
  /** Anything else. */
  texts: number
}

export const noCounts = (): KindCounts => ({
  numbers: 0,
  complex: 0,
  booleans: 0,
  datetimes: 0,
  spoiled: 0,
  texts: 0,
})

export function countCell(counts: KindCounts, cell: Cell): void {
  if (cell.kind === "number") counts.numbers++
  else if (cell.kind === "complex") counts.complex++
  else if (cell.kind === "boolean") counts.booleans++
  else if (cell.kind === "datetime") counts.datetimes++
  else if (cell.kind === "bad") {
    if (cell.code === "not-a-number") counts.texts++
    else counts.spoiled++
  }
}

/**
 * The kind of a field: boolean or datetime when every cell is one, number when at least half of the cells are numbers,
 * text otherwise. A field without any value is a number column.
 *
 * @see docs/intake.md, Cells
 */
export function fieldKind(counts: KindCounts): FieldKind {
  const { numbers, complex, booleans, datetimes, spoiled, texts } = counts
  const all = numbers + complex + booleans + datetimes + spoiled + texts
  if (all === 0) return "number"
  if (booleans === all) return "boolean"
  if (datetimes === all) return "datetime"
  if (2 * (numbers + complex + spoiled) < all) return "text"
  return complex > 0 ? "complex" : "number"
}
