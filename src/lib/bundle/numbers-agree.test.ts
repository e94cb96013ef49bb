import { expect, test } from "vitest"
import { firstDifference } from "./numbers-agree"

test("numbers within the tolerance agree, words are not compared", () => {
  const results = { panels: [{ value: 0.5, text: "0.5(1)", low: null, at: [1, 2] }] }
  const close = { panels: [{ value: 0.5 * (1 + 5e-10), text: "0.50(1)", low: null, at: [1, 2] }] }
  expect(firstDifference(results, close)).toBeNull()
})

test("the first place that differs is named", () => {
  expect(firstDifference({ a: [{ b: 1 }] }, { a: [{ b: 1.000001 }] })).toBe("/a/0/b")
  expect(firstDifference({ a: 1 }, { a: null })).toBe("/a")
  expect(firstDifference({ a: 1 }, { b: 1 })).toBe("/a")
  expect(firstDifference([1], [1, 2])).toBe("")
  expect(firstDifference({ a: 0 }, { a: -0 })).toBeNull()
})
