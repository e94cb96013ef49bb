import { canonicalJson } from "@/lib/domain/canonical-json"
import { readTableFrame } from "@/lib/domain/table-frame"
import { datasetsOf } from "@specs/compute-figure"
import type { DataTable, PanelInput, PanelResult } from "@specs/figure-kind"
import { kindOf } from "@specs/kinds"
import type { PanelParams } from "@specs/registry"
import { SpecError, type SpecIssue } from "@specs/spec-error"
import type { AnalysisAnswer, AnalysisRequest } from "./analysis-messages"

/*
 * The statistics in a thread of their own: the very functions that make the record on the server. Tables are fetched once
 * a dataset version, and what a fit window does not touch is kept between steps of a drag.
 */

const tables = new Map<string, Promise<DataTable>>()
const prepared = new Map<string, unknown>()
const mostPrepared = 8

const answer = (message: AnalysisAnswer) => self.postMessage(message)

function loadTable(manuscriptId: string, dataset: string, number: number): Promise<DataTable> {
  const address = `/api/v1/manuscripts/${manuscriptId}/datasets/${encodeURIComponent(dataset)}/versions/${number}/columns`
  const known = tables.get(address)
  if (known) return known
  const loading = fetch(address).then(async (response) => {
    if (!response.ok) throw new Error(`The columns of ${dataset} could not be loaded (${response.status}).`)
    return readTableFrame(await response.arrayBuffer())
  })
  tables.set(address, loading)
  // A failed load is tried again with the next change.
  loading.catch(() => tables.delete(address))
  return loading
}

function computePanel(panel: PanelParams, input: PanelInput, tablesKey: string, id: number): PanelResult {
  const kind = kindOf(panel.kind)
  if (!kind.live) return kind.compute(input, panel)
  const key = canonicalJson([panel.kind, tablesKey, kind.live.preparedFrom(panel)])
  let state = prepared.get(key)
  if (state === undefined) {
    state = kind.live.prepare(input, panel, (done, total) =>
      answer({ type: "progress", id, what: "Resampling", share: done / total }),
    )
    if (prepared.size >= mostPrepared) prepared.delete(prepared.keys().next().value!)
    prepared.set(key, state)
  }
  return kind.live.fit(state, panel)
}

async function compute(request: Extract<AnalysisRequest, { type: "compute" }>): Promise<void> {
  const { id, manuscriptId, spec, pins } = request
  const names = datasetsOf(spec).filter((name) => pins[name] !== undefined)
  if (names.some((name) => !tables.has(name)))
    answer({ type: "progress", id, what: "Loading columns", share: 0 })
  const loaded = await Promise.all(names.map((name) => loadTable(manuscriptId, name, pins[name]!)))
  const input = { tables: new Map(names.map((name, index) => [name, loaded[index]!])) }
  const started = performance.now()
  const issues: SpecIssue[] = []
  const panels = spec.panels.flatMap((panel, index) => {
    try {
      return [computePanel(panel, input, canonicalJson(pins), id)]
    } catch (error) {
      if (!(error instanceof SpecError)) throw error
      issues.push(...error.issues.map((issue) => ({ ...issue, pointer: `/panels/${index}${issue.pointer}` })))
      return []
    }
  })
  if (issues.length > 0) answer({ type: "issues", id, issues })
  else answer({ type: "results", id, panels, ms: performance.now() - started })
}

async function propose(request: Extract<AnalysisRequest, { type: "propose" }>): Promise<void> {
  const { id, manuscriptId, kind, dataset, number, roles } = request
  const table = await loadTable(manuscriptId, dataset, number)
  const panel = kindOf(kind).propose(dataset, table, new Map(Object.entries(roles)))
  answer({ type: "proposal", id, panel })
}

self.onmessage = ({ data }: MessageEvent<AnalysisRequest>) => {
  const work = data.type === "compute" ? compute(data) : propose(data)
  work.catch((error: unknown) => {
    const message = error instanceof Error ? error.message : String(error)
    answer({ type: "issues", id: data.id, issues: [{ pointer: "", code: "analysis-failed", message }] })
  })
}
