import { expect, test } from "vitest"
import { canonicalJson } from "./canonical-json"

test("keys, numbers and escapes as in the example of RFC 8785, section 3.2.2", () => {
  const value = {
    numbers: [333333333.33333329, 1e30, 4.5, 2e-3, 0.000000000000000000000000001],
    string: "\u20ac$\u000F\u000aA'\u0042\u0022\u005c\\\"\u002f",
    literals: [null, true, false],
  }
  expect(canonicalJson(value)).toBe(
    '{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}',
  )
})

test("what JSON cannot say is refused, not turned into null", () => {
  expect(() => canonicalJson([Number.NaN])).toThrow(TypeError)
  expect(() => canonicalJson([undefined])).toThrow(TypeError)
  expect(canonicalJson({ b: 1, a: undefined })).toBe('{"b":1}')
})
