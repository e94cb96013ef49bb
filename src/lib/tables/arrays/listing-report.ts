import type { IntakeCodeName, SentenceValues } from "../intake-codes"
import { IntakeRefusal } from "../intake-codes"
import type { IntakeJournal } from "../intake-journal"

/** Notes and problems found while the arrays of a file are listed; said again whenever reading starts over. */
export class ListingReport {
  readonly #problems: { code: IntakeCodeName; values: SentenceValues; place: string }[] = []
  readonly #notes: { code: IntakeCodeName; values: SentenceValues }[] = []

  problem(code: IntakeCodeName, place: string, values: SentenceValues = {}): void {
    this.#problems.push({ code, values: { name: place, column: place, ...values }, place })
  }

  note(code: IntakeCodeName, values: SentenceValues = {}): void {
    this.#notes.push({ code, values })
  }

  tell(journal: IntakeJournal): void {
    for (const { code, values } of this.#notes) journal.note(code, values)
    for (const { code, values, place } of this.#problems) journal.problem(code, values, { line: place })
  }

  /** Nothing is left to read: the first problem says why, if there is one. */
  refusal(): IntakeRefusal {
    const [first] = this.#problems
    return first ? new IntakeRefusal(first.code, first.values, first.place) : new IntakeRefusal("no-table")
  }
}
