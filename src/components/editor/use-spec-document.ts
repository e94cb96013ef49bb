import { useCallback, useEffect, useReducer, useState } from "react"
import { findKeptSpec, forgetKeptSpec, keepSpec } from "@/lib/client/kept-spec"
import type { FigureSpec } from "@specs/figure-spec"
import { changeSpec, openSpec, specText } from "./spec-document"

/**
 * The edited spec of a figure, kept in the browser while it differs from what it started from, so that a reload or a
 * crash loses nothing.
 */
export function useSpecDocument(figureId: string, start: FigureSpec, basedOn: number | null) {
  const [document, change] = useReducer(changeSpec, start, openSpec)
  const [restored, setRestored] = useState(false)
  const [ready, setReady] = useState(false)
  const startText = specText(start)
  const unsaved = specText(document.spec) !== startText || basedOn === null

  useEffect(() => {
    const kept = findKeptSpec(figureId)
    if (kept && kept.basedOn === basedOn && specText(kept.spec) !== startText) {
      change({ type: "replace", spec: kept.spec })
      setRestored(true)
    }
    setReady(true)
    // Once, when the editor opens.
    // eslint-disable-next-line react-hooks/exhaustive-deps -- see above
  }, [])

  useEffect(() => {
    if (!ready) return
    if (specText(document.spec) === startText) forgetKeptSpec(figureId)
    else keepSpec(figureId, document.spec, basedOn)
  }, [ready, document.spec, startText, figureId, basedOn])

  const discard = useCallback(() => {
    change({ type: "replace", spec: start })
    setRestored(false)
  }, [start])
  const saved = useCallback(() => {
    setReady(false)
    forgetKeptSpec(figureId)
  }, [figureId])
  return { document, change, unsaved, restored, discard, saved }
}
