import { useCallback, useEffect, useReducer, useRef, useState } from "react"
import { findKeptSpec, forgetKeptSpec, keepSpec } from "@/lib/client/kept-spec"
import type { FigureSpec } from "@specs/figure-spec"
import { changeSpec, openSpec, specText } from "./spec-document"

/**
 * The edited spec of a figure, kept in the browser while it differs from what it started from, so that a reload or a
 * crash loses nothing.
 */
export function useSpecDocument(figureId: string, start: FigureSpec, basedOn: number | null) {
  const startText = specText(start)
  const [kept] = useState(() => {
    const found = findKeptSpec(figureId)
    return found && found.basedOn === basedOn && specText(found.spec) !== startText ? found.spec : null
  })
  const [document, change] = useReducer(changeSpec, start, (opened) =>
    kept ? changeSpec(openSpec(opened), { type: "replace", spec: kept }) : openSpec(opened),
  )
  const [restored, setRestored] = useState(kept !== null)
  const isSaved = useRef(false)
  const unsaved = specText(document.spec) !== startText || basedOn === null

  useEffect(() => {
    if (isSaved.current) return
    if (specText(document.spec) === startText) forgetKeptSpec(figureId)
    else keepSpec(figureId, document.spec, basedOn)
  }, [document.spec, startText, figureId, basedOn])

  const discard = useCallback(() => {
    change({ type: "replace", spec: start })
    setRestored(false)
  }, [start])
  const saved = useCallback(() => {
    isSaved.current = true
    forgetKeptSpec(figureId)
  }, [figureId])
  return { document, change, unsaved, restored, discard, saved }
}
