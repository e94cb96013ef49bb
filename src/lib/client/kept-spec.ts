import { figureSpec, type FigureSpec } from "@specs/figure-spec"

/** Unsaved work on a figure, kept in this browser until it is saved or discarded. */
export interface KeptSpec {
  readonly spec: FigureSpec
  readonly basedOn: number | null
  readonly at: string
}

const keyOf = (figureId: string) => `afterquench.unsaved.${figureId}`

/** What was left unsaved; null when there is nothing, or nothing that can still be read. */
export function findKeptSpec(figureId: string): KeptSpec | null {
  const text = localStorage.getItem(keyOf(figureId))
  if (text === null) return null
  const kept = JSON.parse(text) as KeptSpec
  const spec = figureSpec.safeParse(kept.spec)
  return spec.success ? { ...kept, spec: spec.data } : null
}

export function keepSpec(figureId: string, spec: FigureSpec, basedOn: number | null): void {
  localStorage.setItem(keyOf(figureId), JSON.stringify({ spec, basedOn, at: new Date().toISOString() }))
}

export function forgetKeptSpec(figureId: string): void {
  localStorage.removeItem(keyOf(figureId))
}
