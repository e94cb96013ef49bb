import type { IntakeCodeName, SentenceValues } from "../intake-codes"

/** Longest name that is taken for a name. */
const MAX_NAME = 200
const reserved = new Set(["__proto__", "constructor", "prototype"])
/** Starts of spreadsheet formulas, markup, TeX, control and direction characters. */
const UNSAFE = /^[=+\-@\t\r]|[<\\$\u0000-\u001f\u007f-\u009f\u2028-\u202e\u2066-\u2069]/

/** Whether a name can be shown as it is and a symbol be derived from it. */
export const isPlainName = (name: string): boolean =>
  !UNSAFE.test(name) && name.length <= MAX_NAME && !reserved.has(name)

type Report = (code: IntakeCodeName, column: number, values: SentenceValues) => void

/**
 * Gives every column a name of its own: numbers the nameless, renames repeats and reports what needs a look. Names stay
 * as typed; they are text, never keys of plain objects.
 *
 * @param report told of empty-name, duplicate-name and unsafe-name with the 1-based column
 */
export function uniqueNames(names: readonly string[], report: Report): string[] {
  const used = new Set<string>()
  return names.map((typed, index) => {
    const column = index + 1
    let name = typed
    if (name === "") {
      name = `column_${column}`
      report("empty-name", column, { k: column, name })
    }
    if (!isPlainName(name)) report("unsafe-name", column, { k: column })
    if (used.has(name)) {
      const free = nextFree(name, used)
      report("duplicate-name", column, { n: name, name: free })
      name = free
    }
    used.add(name)
    return name
  })
}

function nextFree(name: string, used: ReadonlySet<string>): string {
  for (let number = 2; ; number++) if (!used.has(`${name}_${number}`)) return `${name}_${number}`
}
