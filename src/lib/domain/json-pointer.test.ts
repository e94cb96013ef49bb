import { describe, expect, test } from "vitest"
import { pointerOf, pointerTokens, valueAt, withValueAt } from "./json-pointer"

// The example document and its pointers: RFC 6901, section 5.
const rfc = {
  foo: ["bar", "baz"],
  "": 0,
  "a/b": 1,
  "c%d": 2,
  "e^f": 3,
  "g|h": 4,
  "i\\j": 5,
  'k"l': 6,
  " ": 7,
  "m~n": 8,
}

describe("JSON pointers", () => {
  test.each([
    ["", rfc],
    ["/foo", ["bar", "baz"]],
    ["/foo/0", "bar"],
    ["/", 0],
    ["/a~1b", 1],
    ["/c%d", 2],
    ["/e^f", 3],
    ["/g|h", 4],
    ["/i\\j", 5],
    ['/k"l', 6],
    ["/ ", 7],
    ["/m~0n", 8],
  ])("RFC 6901 section 5: %s", (pointer, expected) => {
    expect(valueAt(rfc, pointer)).toEqual(expected)
    expect(pointerOf(pointerTokens(pointer))).toBe(pointer)
  })

  test("setting copies only the way to the place", () => {
    const before = { fit: { window: [20, 2000] }, other: {} }
    const after = withValueAt(before, "/fit/window/1", 500)
    expect(after).toEqual({ fit: { window: [20, 500] }, other: {} })
    expect(before.fit.window[1]).toBe(2000)
    expect(after.other).toBe(before.other)
  })

  test("setting makes missing objects, removes, and appends", () => {
    expect(withValueAt({}, "/axes/x/label", "t")).toEqual({ axes: { x: { label: "t" } } })
    expect(withValueAt({ a: 1, b: 2 }, "/a", undefined)).toEqual({ b: 2 })
    expect(withValueAt({ list: [1] }, "/list/-", 2)).toEqual({ list: [1, 2] })
    expect(withValueAt({ list: [1, 2] }, "/list/0", undefined)).toEqual({ list: [2] })
  })

  test("a way through a number or past an end is refused", () => {
    expect(() => withValueAt({ a: 1 }, "/a/b", 2)).toThrow(/not an object/)
    expect(() => withValueAt({ list: [] }, "/list/3", 2)).toThrow(/no element 3/)
  })

  test("prototype names are plain keys", () => {
    const out = withValueAt({}, "/__proto__/polluted", 1)
    expect(({} as Record<string, unknown>)["polluted"]).toBeUndefined()
    expect(valueAt(out, "/toString")).toBeUndefined()
  })
})
