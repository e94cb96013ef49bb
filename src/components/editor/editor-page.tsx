import { useCallback, useEffect, useMemo, useState } from "react"
import { Button } from "@/components/parts/button"
import { Field } from "@/components/parts/field"
import { HeatMark } from "@/components/parts/heat"
import { MarginNote } from "@/components/parts/note"
import { ResultsLedger } from "@/components/figure/results-ledger"
import { VersionRail } from "@/components/figure/version-rail"
import { WarningNotes } from "@/components/figure/warning-notes"
import { call, sentenceOf } from "@/lib/client/call"
import { Island } from "@/lib/client/island"
import type { MathBox } from "@/lib/client/typeset"
import { startAnalysis, useAnalysis } from "@/lib/client/use-analysis"
import { type FigureAnswer, type FigureVersionAnswer, saveFigureVersion } from "@/lib/contracts/figures"
import { valueAt } from "@/lib/domain/json-pointer"
import type { FigureSpec } from "@specs/figure-spec"
import { kindOf } from "@specs/kinds"
import { resultsDocument } from "@specs/results-document"
import { ProofPlate } from "./proof-plate"
import { ProposeFigure } from "./propose-figure"
import { SentenceView } from "./sentence-view"
import type { SlotSurroundings } from "./slot-control"
import { SpecSheet } from "./spec-sheet"
import { useSpecDocument } from "./use-spec-document"
import { WorkingView } from "./working-view"

export interface EditorDataset {
  readonly name: string
  readonly number: number
  readonly columns: SlotSurroundings["columns"]
}

interface Props {
  readonly manuscriptId: string
  readonly figure: FigureAnswer
  /** The version to start from; null before the first one. */
  readonly version: FigureVersionAnswer | null
  readonly datasets: readonly EditorDataset[]
  readonly boxes: Readonly<Record<string, MathBox | null>>
}

/** Where a figure is made: its sentence, the plot that follows it, the proof beside it. */
export function EditorPage({ boxes, ...props }: Props) {
  return (
    <Island boxes={boxes}>
      <Editor {...props} />
    </Island>
  )
}

function Editor({ manuscriptId, figure, version, datasets }: Omit<Props, "boxes">) {
  const [worker] = useState(startAnalysis)
  useEffect(() => () => worker.terminate(), [worker])
  const [proposed, setProposed] = useState<FigureSpec | null>(null)
  const start = version?.spec ?? proposed
  if (!start)
    return (
      <ProposeFigure
        manuscriptId={manuscriptId}
        figure={figure}
        datasets={datasets}
        worker={worker}
        onProposed={setProposed}
      />
    )
  return (
    <OpenEditor
      manuscriptId={manuscriptId}
      figure={figure}
      version={version}
      start={start}
      datasets={datasets}
      worker={worker}
    />
  )
}

function OpenEditor({
  manuscriptId,
  figure,
  version,
  start,
  datasets,
  worker,
}: Omit<Props, "boxes"> & { start: FigureSpec; worker: Worker }) {
  const { document, change, unsaved, restored, discard, saved } = useSpecDocument(
    figure.id,
    start,
    version?.number ?? null,
  )
  const [panelIndex, setPanelIndex] = useState(0)
  const pins = useMemo(
    () => Object.fromEntries(datasets.map(({ name, number }) => [name, number])),
    [datasets],
  )
  const analysis = useAnalysis(worker, manuscriptId, document.spec, pins)
  const index = Math.min(panelIndex, document.spec.panels.length - 1)
  const panel = document.spec.panels[index]!
  const result = analysis.current?.panels[index]
  const sentence = useMemo(() => kindOf(panel.kind).sentence(panel, result), [panel, result])
  const dataset = datasets.find(({ name }) => name === panel.data.dataset)
  const surroundings = useMemo(
    () => ({ columns: dataset?.columns ?? [], datasets: datasets.map(({ name }) => name) }),
    [dataset, datasets],
  )
  const set = useCallback(
    (pointer: string, value: unknown, gesture?: string) =>
      change({ type: "set", pointer: `/panels/${index}${pointer}`, value, ...(gesture ? { gesture } : {}) }),
    [change, index],
  )
  const issues = [...document.issues, ...analysis.issues]
  const results = analysis.current && resultsDocument({ panels: analysis.current.panels })

  return (
    <article className="sheet">
      <header className="across flex flex-wrap items-baseline gap-x-5 gap-y-2">
        <h1 className="m-0 text-head">{figure.title || figure.name}</h1>
        {unsaved ? (
          <HeatMark heat="work">unsaved work{restored ? ", restored" : ""}</HeatMark>
        ) : (
          version && <HeatMark heat="proposed">version {version.number}</HeatMark>
        )}
        <span className="flex gap-4">
          <Button
            look="quiet"
            isDisabled={document.past.length === 0}
            onPress={() => change({ type: "undo" })}
          >
            Undo
          </Button>
          <Button
            look="quiet"
            isDisabled={document.future.length === 0}
            onPress={() => change({ type: "redo" })}
          >
            Redo
          </Button>
          {unsaved && version && (
            <Button look="quiet" onPress={discard}>
              Go back to version {version.number}
            </Button>
          )}
        </span>
      </header>
      <section className="across" aria-label="The panel as a sentence">
        {document.spec.panels.length > 1 && (
          <PanelTabs count={document.spec.panels.length} current={index} onChoose={setPanelIndex} />
        )}
        <SentenceView
          sentence={sentence}
          issues={issues}
          surroundings={surroundings}
          valueOf={(pointer) => valueAt(panel, pointer)}
          onChange={set}
        />
      </section>
      <div className="min-w-0">
        <div className="grid gap-6 xl:grid-cols-2">
          <WorkingView
            analysis={analysis}
            index={index}
            spec={document.spec}
            onWindow={(window, gesture) => set("/fit/window", window, gesture)}
          />
          <ProofPlate manuscriptId={manuscriptId} figure={figure} version={version} />
        </div>
        {results && <ResultsLedger panels={results.panels} />}
        {analysis.current && (
          <p className="text-fine text-soft">
            Computed here in {Math.max(1, Math.round(analysis.current.ms))} ms by the code that makes the
            record.
          </p>
        )}
        <SpecSheet
          text={document.text}
          issues={document.issues}
          onText={(text) => change({ type: "text", text })}
        />
      </div>
      <aside className="grid content-start gap-6" aria-label="Save, and what a referee would ask">
        <SaveVersion
          manuscriptId={manuscriptId}
          figure={figure}
          spec={document.spec}
          basedOn={version?.number ?? null}
          pins={pins}
          isBlocked={issues.length > 0}
          onSaved={saved}
        />
        {issues.map((issue) => (
          <MarginNote key={issue.pointer + issue.message} weight="wrong">
            {issue.message} <span className="font-mono text-soft">{issue.pointer}</span>
          </MarginNote>
        ))}
        {result && <WarningNotes warnings={result.warnings} />}
        {figure.versions.length > 0 && (
          <VersionRail
            figure={figure}
            current={version?.number ?? null}
            address={`/manuscripts/${manuscriptId}/figures/${figure.id}`}
          />
        )}
      </aside>
    </article>
  )
}

function PanelTabs({
  count,
  current,
  onChoose,
}: {
  count: number
  current: number
  onChoose: (index: number) => void
}) {
  return (
    <div role="group" aria-label="Panels" className="mb-2 flex gap-1">
      {Array.from({ length: count }, (_, index) => (
        <Button
          key={index}
          look={index === current ? "act" : "plain"}
          aria-pressed={index === current}
          onPress={() => onChoose(index)}
        >
          ({String.fromCharCode(97 + index)})
        </Button>
      ))}
    </div>
  )
}

function SaveVersion({
  manuscriptId,
  figure,
  spec,
  basedOn,
  pins,
  isBlocked,
  onSaved,
}: {
  manuscriptId: string
  figure: FigureAnswer
  spec: FigureSpec
  basedOn: number | null
  pins: Readonly<Record<string, number>>
  isBlocked: boolean
  onSaved: () => void
}) {
  const [message, setMessage] = useState("")
  const [problem, setProblem] = useState<string | undefined>()
  const [isSaving, setSaving] = useState(false)
  const save = async () => {
    setSaving(true)
    setProblem(undefined)
    try {
      const params = { manuscriptId, figureId: figure.id }
      const { data } = await call(saveFigureVersion, {
        params,
        body: { spec, message, basedOn, pins: { ...pins } },
      })
      onSaved()
      location.assign(`/manuscripts/${manuscriptId}/figures/${figure.id}/versions/${data.number}`)
    } catch (error) {
      setProblem(sentenceOf(error))
      setSaving(false)
    }
  }
  return (
    <form
      className="grid gap-2"
      onSubmit={(event) => {
        event.preventDefault()
        void save()
      }}
    >
      <Field
        label="What changed"
        hint="Your co-authors read this in the list of versions."
        value={message}
        problem={problem}
        onChange={(event) => setMessage(event.target.value)}
      />
      <div>
        <Button look="act" type="submit" isDisabled={isSaving || isBlocked}>
          Save version {(figure.versions[0]?.number ?? 0) + 1}
        </Button>
      </div>
      {isBlocked && <p className="m-0 text-small text-soft">Settle what is marked below first.</p>}
    </form>
  )
}
