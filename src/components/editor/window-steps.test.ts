import { describe, expect, test } from "vitest"
import { nearestIndex, shiftedEdge } from "./window-steps"

const grid = [1, 2, 4, 8, 16, 32, 64, 128]

describe("moving an edge of the fit window", () => {
  test("nearest is by ratio on a positive grid", () => {
    // Between 4 and 8 the geometric mean is 5.657, the arithmetic one 6.
    expect(grid[nearestIndex(grid, 5.8)]).toBe(8)
    expect(grid[nearestIndex(grid, 5.5)]).toBe(4)
  })
  test("arrows move by one grid point and stop at the ends", () => {
    expect(shiftedEdge(grid, 8, "ArrowRight", false)).toBe(16)
    expect(shiftedEdge(grid, 8, "ArrowLeft", false)).toBe(4)
    expect(shiftedEdge(grid, 1, "ArrowLeft", false)).toBe(1)
    expect(shiftedEdge(grid, 8, "Home", false)).toBe(1)
    expect(shiftedEdge(grid, 8, "End", false)).toBe(128)
    expect(shiftedEdge(grid, 8, "a", false)).toBeNull()
  })
  test("Shift moves by a tenth of a decade where the grid is finer than that, else by one point", () => {
    const fine = Array.from({ length: 301 }, (_, k) => 10 ** (k / 100))
    expect(shiftedEdge(fine, 10, "ArrowRight", true)).toBeCloseTo(10 ** 1.1, 10)
    expect(shiftedEdge(grid, 8, "ArrowRight", true)).toBe(16)
  })
})
