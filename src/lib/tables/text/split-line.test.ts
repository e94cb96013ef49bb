import { expect, test } from "vitest"
import { splitLine } from "./split-line"

const texts = (line: string, delimiter: Parameters<typeof splitLine>[1]) => {
  const fields = splitLine(line, delimiter)
  return typeof fields === "string" ? fields : fields.map(({ text }) => text)
}

// Rules: docs/intake.md, Delimiter, decimal, quotes; RFC 4180 for quotes.
test.each<[string, Parameters<typeof splitLine>[1], readonly string[] | string]>([
  ["1,2,3", ",", ["1", "2", "3"]],
  [" 1 , 2 ,", ",", ["1", "2", ""]],
  [",,", ",", ["", "", ""]],
  ["", ",", [""]],
  ['"a, b","say ""hi""",1', ",", ["a, b", 'say "hi"', "1"]],
  ['x"y,1', ",", ['x"y', "1"]],
  ['"open,1', ",", "open"],
  ['"a" b,1', ",", "stray"],
  ['"a" ,1', ",", ["a", "1"]],
  ["(1.5,2.5),3", ",", ["(1.5,2.5)", "3"]],
  ["f(x,y),3", ",", ["f(x", "y)", "3"]],
  ["a\t\tb", "\\t", ["a", "", "b"]],
  [" a\t b", "\\t", ["a", "b"]],
  ["  1 \t 2  ", "blank", ["1", "2"]],
  ['"a b" 2', "blank", ["a b", "2"]],
  ["(1 + 2j) 3", "blank", ["(1 + 2j)", "3"]],
  ["x (a b) 3", "blank", ["x", "(a", "b)", "3"]],
  ["1\u00a02", "blank", ["1", "2"]],
  ["", "blank", []],
])("%j by %s", (line, delimiter, expected) => {
  expect(texts(line, delimiter)).toEqual(expected)
})
