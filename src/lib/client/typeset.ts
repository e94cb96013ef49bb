import { useEffect, useState, useSyncExternalStore } from "react"
import { call } from "./call"
import { typesetMath } from "@/lib/contracts/typeset"

/** A formula as paths: sizes in em, baseline at y = 0 of a coordinate system of 1000 units an em. */
export interface MathBox {
  readonly w: number
  readonly h: number
  readonly d: number
  readonly body: string
}

const boxes = new Map<string, MathBox | null>()
const waiting = new Set<string>()
const listeners = new Set<() => void>()
let timer: ReturnType<typeof setTimeout> | null = null

async function fetchWaiting(): Promise<void> {
  timer = null
  const tex = [...waiting]
  waiting.clear()
  for (let start = 0; start < tex.length; start += 100) {
    const part = tex.slice(start, start + 100)
    try {
      const { data } = await call(typesetMath, { body: { tex: part } })
      part.forEach((source, index) => boxes.set(source, data.boxes[index]?.box ?? null))
    } catch (error) {
      // Formulas stay readable as source; the next page asks again.
      console.warn("Formulas could not be set:", error)
      part.forEach((source) => boxes.set(source, null))
    }
  }
  listeners.forEach((listener) => listener())
}

/** Formulas kept at most; a server meets those of many manuscripts. */
const mostBoxes = 5000

/** Puts formulas that the server has already set into the cache, so that the first paint has them. */
export function rememberBoxes(known: Readonly<Record<string, MathBox | null>>): void {
  if (boxes.size > mostBoxes) boxes.clear()
  for (const [tex, box] of Object.entries(known)) boxes.set(tex, box)
}

/** The box of a formula: undefined while it is being set, null when it cannot be set. All asked for in one tick go in one request. */
export function useMathBox(tex: string): MathBox | null | undefined {
  const [subscribe] = useState(() => (listener: () => void) => {
    listeners.add(listener)
    return () => void listeners.delete(listener)
  })
  const box = useSyncExternalStore(
    subscribe,
    () => boxes.get(tex),
    () => boxes.get(tex),
  )
  useEffect(() => {
    if (boxes.has(tex) || waiting.has(tex)) return
    waiting.add(tex)
    timer ??= setTimeout(() => void fetchWaiting(), 0)
  }, [tex])
  return box
}

/** The boxes of several formulas at once, for drawings that need all of them. */
export async function typesetAll(tex: readonly string[]): Promise<Map<string, MathBox>> {
  const missing = tex.filter((source) => !boxes.has(source))
  missing.forEach((source) => waiting.add(source))
  if (missing.length > 0) await fetchWaiting()
  return new Map(tex.flatMap((source) => (boxes.get(source) ? [[source, boxes.get(source)!]] : [])))
}
