import { pointerOf } from "@/lib/domain/json-pointer"

/** Relative difference up to which numbers of two versions of the product count as the same. */
export const versionTolerance = 1e-9

/**
 * Compares the numbers of two JSON values; words may differ.
 *
 * @returns the pointer of the first place where they differ in shape or by more than the tolerance, or null
 */
export function firstDifference(
  a: unknown,
  b: unknown,
  tolerance = versionTolerance,
  at: readonly (string | number)[] = [],
): string | null {
  if (typeof a === "number" && typeof b === "number") {
    const scale = Math.max(Math.abs(a), Math.abs(b))
    return Math.abs(a - b) <= tolerance * scale ? null : pointerOf(at)
  }
  if (typeof a === "string" && typeof b === "string") return null
  if (typeof a !== "object" || typeof b !== "object" || a === null || b === null)
    return a === b ? null : pointerOf(at)
  const keys = Object.keys(a)
  if (keys.length !== Object.keys(b).length) return pointerOf(at)
  for (const key of keys) {
    if (!(key in b)) return pointerOf([...at, key])
    const [left, right] = [a, b].map((side) => (side as Record<string, unknown>)[key])
    const found = firstDifference(left, right, tolerance, [...at, key])
    if (found !== null) return found
  }
  return null
}
