import { useEffect, useState } from "react"
import type { MathBox } from "./set-runs"

/** Sets formulas: the answer leaves out what cannot be set. */
export type Typeset = (tex: readonly string[]) => Promise<ReadonlyMap<string, MathBox>>

/** Formulas that have been set so far; asks for those that are new. */
export function useMathBoxes(typeset: Typeset) {
  const [boxes, setBoxes] = useState<ReadonlyMap<string, MathBox>>(new Map())
  const [wanted, setWanted] = useState<readonly string[]>([])
  useEffect(() => {
    if (wanted.length === 0) return
    let current = true
    typeset(wanted)
      .then((found) => current && found.size > 0 && setBoxes((known) => new Map([...known, ...found])))
      .catch((error: unknown) => console.warn("Formulas could not be set:", error))
    return () => {
      current = false
    }
  }, [wanted, typeset])
  return { boxes, want: setWanted }
}
