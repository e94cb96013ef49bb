import { type IntakeCodeName, type SentenceValues, sentence } from "./intake-codes"
import type { RecipeInput } from "./reading-recipe"
import type { IntakeAsk, IntakeNote, IntakeProblem } from "./table-reading"

/** Longest piece of a file that a problem repeats. */
const MAX_TEXT = 200

type Place = {
  readonly line?: number | string | null
  readonly column?: number | null
  readonly text?: string
}

/** Collects what a reading has to say: every problem is counted, the first ones of each code are listed. */
export class IntakeJournal {
  readonly notes: IntakeNote[] = []
  readonly problems: IntakeProblem[] = []
  readonly asks: IntakeAsk[] = []
  readonly #counts = new Map<IntakeCodeName, number>()

  constructor(
    readonly maxListed: number,
    readonly onProblem?: (problem: IntakeProblem) => void,
  ) {}

  note(
    code: IntakeCodeName,
    values: SentenceValues = {},
    where: Pick<IntakeNote, "lines" | "texts"> = {},
  ): void {
    this.notes.push({ code, message: sentence(code, values), ...where })
  }

  problem(
    code: IntakeCodeName,
    values: SentenceValues,
    { line = null, column = null, text }: Place = {},
  ): void {
    const count = (this.#counts.get(code) ?? 0) + 1
    this.#counts.set(code, count)
    if (count > this.maxListed && !this.onProblem) return
    const shown = text === undefined ? {} : { text: text.slice(0, MAX_TEXT) }
    const problem = { line, column, code, message: sentence(code, values), ...shown }
    this.onProblem?.(problem)
    if (count <= this.maxListed) this.problems.push(problem)
  }

  /** Counts problems that the reader did not keep. */
  more(code: IntakeCodeName, count: number): void {
    if (count > 0) this.#counts.set(code, (this.#counts.get(code) ?? 0) + count)
  }

  ask(
    code: IntakeCodeName,
    values: SentenceValues,
    choices: readonly { readonly label: string; readonly recipe: RecipeInput }[],
    { line = null, column = null }: Place = {},
  ): void {
    this.asks.push({ code, message: sentence(code, values), line, column, choices })
  }

  get problemCounts(): { readonly code: IntakeCodeName; readonly count: number }[] {
    return [...this.#counts].map(([code, count]) => ({ code, count }))
  }
}
