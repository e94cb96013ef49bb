import { useEffect, useRef, useState } from "react"
import type { PanelResult } from "@specs/figure-kind"
import type { FigureSpec } from "@specs/figure-spec"
import type { SpecIssue } from "@specs/spec-error"
import type { AnalysisAnswer, AnalysisRequest, DatasetPins } from "./analysis-messages"

type WithoutId<T> = T extends unknown ? Omit<T, "id"> : never

/** Starts the analysis thread of an editor. */
export function startAnalysis(): Worker {
  return new Worker(new URL("./analysis.worker.ts", import.meta.url), { type: "module" })
}

/** Sends one request and waits for its answer. */
export function askAnalysis(worker: Worker, request: WithoutId<AnalysisRequest>): Promise<AnalysisAnswer> {
  const id = -Math.floor(Math.random() * 1e9) - 1
  return new Promise((resolve) => {
    const listen = ({ data }: MessageEvent<AnalysisAnswer>) => {
      if (data.id !== id || data.type === "progress") return
      worker.removeEventListener("message", listen)
      resolve(data)
    }
    worker.addEventListener("message", listen)
    worker.postMessage({ ...request, id })
  })
}

export interface Analysis {
  /** Results of the newest spec that could be computed, with that spec: the two belong together. */
  readonly current: {
    readonly spec: FigureSpec
    readonly panels: readonly PanelResult[]
    readonly ms: number
  } | null
  readonly issues: readonly SpecIssue[]
  readonly progress: { readonly what: string; readonly share: number } | null
}

/**
 * Numbers for the spec being edited. One computation runs at a time; what changes meanwhile is computed next, and states
 * in between are passed over, so that a drag never queues up.
 */
export function useAnalysis(
  worker: Worker | null,
  manuscriptId: string,
  spec: FigureSpec | null,
  pins: DatasetPins,
): Analysis {
  const [analysis, setAnalysis] = useState<Analysis>({ current: null, issues: [], progress: null })
  const running = useRef<{ id: number; spec: FigureSpec } | null>(null)
  const waiting = useRef<FigureSpec | null>(null)
  const send = useRef<(spec: FigureSpec) => void>(() => {})

  useEffect(() => {
    if (!worker) return
    let count = 0
    send.current = (next) => {
      if (running.current) {
        waiting.current = next
        return
      }
      count += 1
      running.current = { id: count, spec: next }
      worker.postMessage({
        type: "compute",
        id: count,
        manuscriptId,
        spec: next,
        pins,
      } satisfies AnalysisRequest)
    }
    const listen = ({ data }: MessageEvent<AnalysisAnswer>) => {
      const job = running.current
      if (!job || data.id !== job.id) return
      if (data.type === "progress") {
        setAnalysis((old) => ({ ...old, progress: data }))
        return
      }
      running.current = null
      if (data.type === "results")
        setAnalysis({
          current: { spec: job.spec, panels: data.panels, ms: data.ms },
          issues: [],
          progress: null,
        })
      else if (data.type === "issues") setAnalysis((old) => ({ ...old, issues: data.issues, progress: null }))
      const next = waiting.current
      waiting.current = null
      if (next) send.current(next)
    }
    worker.addEventListener("message", listen)
    return () => worker.removeEventListener("message", listen)
  }, [worker, manuscriptId, pins])

  useEffect(() => {
    if (worker && spec) send.current(spec)
  }, [worker, spec, pins])
  return analysis
}
