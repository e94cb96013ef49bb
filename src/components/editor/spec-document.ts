import { withValueAt } from "@/lib/domain/json-pointer"
import type { FigureSpec } from "@specs/figure-spec"
import { readSpec } from "@specs/read-spec"
import type { SpecIssue } from "@specs/spec-error"

/**
 * The one document that the sentence, the plot and the JSON sheet edit. `text` is what the sheet shows; `spec` is the
 * last state of it that was valid, so that the plot always has something to show.
 */
export interface SpecDocument {
  readonly text: string
  readonly spec: FigureSpec
  readonly issues: readonly SpecIssue[]
  readonly past: readonly FigureSpec[]
  readonly future: readonly FigureSpec[]
  /** Identifies a run of changes that undo takes back at once, such as one drag. */
  readonly gesture: string | null
}

export type SpecChange =
  | { readonly type: "set"; readonly pointer: string; readonly value: unknown; readonly gesture?: string }
  | { readonly type: "text"; readonly text: string }
  | { readonly type: "replace"; readonly spec: FigureSpec }
  | { readonly type: "undo" }
  | { readonly type: "redo" }

const limitOfUndo = 200

export const specText = (spec: FigureSpec): string => JSON.stringify(spec, null, 2)

/** Starts from a saved spec. */
export function openSpec(spec: FigureSpec): SpecDocument {
  return { text: specText(spec), spec, issues: [], past: [], future: [], gesture: null }
}

function moveTo(document: SpecDocument, spec: FigureSpec, gesture: string | null): SpecDocument {
  const sameGesture = gesture !== null && gesture === document.gesture
  return {
    text: specText(spec),
    spec,
    issues: [],
    past: sameGesture ? document.past : [...document.past, document.spec].slice(-limitOfUndo),
    future: [],
    gesture,
  }
}

/** Applies one change. A change that would make the spec invalid is kept out of it and reported as issues. */
export function changeSpec(document: SpecDocument, change: SpecChange): SpecDocument {
  switch (change.type) {
    case "set": {
      const read = readSpec(JSON.stringify(withValueAt(document.spec, change.pointer, change.value)))
      return "spec" in read
        ? moveTo(document, read.spec, change.gesture ?? null)
        : { ...document, issues: read.issues }
    }
    case "text": {
      const read = readSpec(change.text)
      if ("issues" in read) return { ...document, text: change.text, issues: read.issues }
      return { ...moveTo(document, read.spec, "text"), text: change.text }
    }
    case "replace":
      return moveTo(document, change.spec, null)
    case "undo": {
      const previous = document.past.at(-1)
      if (!previous) return document
      return {
        ...openSpec(previous),
        past: document.past.slice(0, -1),
        future: [document.spec, ...document.future],
      }
    }
    case "redo": {
      const next = document.future[0]
      if (!next) return document
      return { ...openSpec(next), past: [...document.past, document.spec], future: document.future.slice(1) }
    }
  }
}
