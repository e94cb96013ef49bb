import { useQuery, useQueryClient } from "@tanstack/react-query"
import { useState } from "react"
import { Button, ButtonLink } from "@/components/parts/button"
import { HeatMark } from "@/components/parts/heat"
import { MarginNote } from "@/components/parts/note"
import { ProgressLine } from "@/components/parts/progress-line"
import { When } from "@/components/parts/when"
import { call, sentenceOf } from "@/lib/client/call"
import { Island } from "@/lib/client/island"
import { useLiveChanges } from "@/lib/client/live"
import type { MathBox } from "@/lib/client/typeset"
import {
  acceptDatasetVersion,
  changeDatasetVersion,
  type DatasetVersionAnswer,
  getDatasetVersion,
  refuseDatasetVersion,
} from "@/lib/contracts/datasets"
import { ColumnsLedger, type ColumnChange } from "./columns-ledger"
import { versionHeat } from "./dataset-list"
import { FilePreview } from "./file-preview"
import type { ShownReading } from "./shown-reading"

interface Props {
  readonly manuscriptId: string
  readonly version: DatasetVersionAnswer
  readonly mayAccept: boolean
  readonly boxes: Readonly<Record<string, MathBox | null>>
}

/** How a file was read, before it is accepted: its lines, its columns, what needs a look. */
export function IntakePage({ boxes, ...props }: Props) {
  return (
    <Island boxes={boxes}>
      <Intake {...props} />
    </Island>
  )
}

function Intake({ manuscriptId, version: initial, mayAccept }: Omit<Props, "boxes">) {
  const params = { manuscriptId, datasetName: initial.datasetName, number: initial.number }
  const client = useQueryClient()
  const { data: version } = useQuery({
    queryKey: ["dataset-version", initial.id],
    queryFn: async () => (await call(getDatasetVersion, { params })).data,
    initialData: initial,
  })
  const [progress, setProgress] = useState<{ what: string; share: number } | null>(null)
  const [problem, setProblem] = useState<string | null>(null)
  useLiveChanges(manuscriptId, (change) => {
    if (change.subject !== version.id) return
    if (change.kind === "dataset-version.progress")
      setProgress({ what: change.what ?? "", share: change.share ?? 0 })
    else void client.invalidateQueries()
  })
  const act = async (doing: () => Promise<{ data: DatasetVersionAnswer }>) => {
    setProblem(null)
    try {
      const { data } = await doing()
      client.setQueryData(["dataset-version", initial.id], data)
    } catch (error) {
      setProblem(sentenceOf(error))
    }
  }
  const reading = version.reading as ShownReading | null
  const { heat, words } = versionHeat[version.state]
  const mayDecide = mayAccept && ["proposed", "refused", "failed"].includes(version.state)
  const correct = (change: ColumnChange) =>
    act(() => call(changeDatasetVersion, { params, body: { columns: [change] } }))

  return (
    <article className="sheet">
      <header className="across">
        <h1 className="m-0 text-head">
          {version.datasetName}, version {version.number}
        </h1>
        <p className="mt-1 mb-0 flex flex-wrap items-baseline gap-x-4 text-small">
          <HeatMark heat={heat}>{words}</HeatMark>
          <span>
            {version.fileName}, {version.uploadedBy.name}, <When at={version.uploadedAt} />
          </span>
          <span className="text-soft">
            {version.rows !== null && `${version.rows.toLocaleString("en").replaceAll(",", "\u202f")} rows, `}
            SHA-256 <span className="font-mono">{version.sha256.slice(0, 12)}</span>
          </span>
        </p>
      </header>
      <div className="grid min-w-0 content-start gap-6">
        {(version.state === "uploaded" || version.state === "reading") && (
          <ProgressLine
            what={progress?.what || "Waiting for the worker"}
            done={progress ? Math.round(progress.share * 100) : undefined}
            total={progress ? 100 : undefined}
            unit="%"
          />
        )}
        {version.failure && (
          <MarginNote weight="wrong">
            {version.failure.message} Correct the file and upload it again.
          </MarginNote>
        )}
        {reading && <FilePreview reading={reading} columns={version.columns} />}
        {version.columns.length > 0 && (
          <ColumnsLedger
            columns={version.columns}
            isOpen={mayDecide && version.state === "proposed"}
            onChange={correct}
          />
        )}
      </div>
      <aside className="grid content-start gap-5 text-small" aria-label="Decide, and what needs a look">
        {problem && <MarginNote weight="wrong">{problem}</MarginNote>}
        {mayDecide && version.state === "proposed" && (
          <section className="grid gap-2">
            <h2 className="label m-0">Is it read right?</h2>
            <p className="m-0">
              An accepted version never changes. Cells that could not be read count as missing; the file is
              kept as it is.
            </p>
            <div className="flex flex-wrap gap-3">
              <Button
                look="act"
                onPress={() =>
                  void act(() => call(acceptDatasetVersion, { params, body: { treatAsMissing: true } }))
                }
              >
                Accept version {version.number}
              </Button>
              <Button onPress={() => void act(() => call(refuseDatasetVersion, { params }))}>Refuse</Button>
            </div>
          </section>
        )}
        {version.state === "accepted" && mayAccept && (
          <div>
            <ButtonLink look="act" href={`/manuscripts/${manuscriptId}/figures/new`}>
              Build a figure
            </ButtonLink>
          </div>
        )}
        <p className="m-0">
          <a
            href={`/api/v1/manuscripts/${manuscriptId}/datasets/${version.datasetName}/versions/${version.number}/original`}
          >
            The file as it was uploaded
          </a>
        </p>
        {reading && <Findings reading={reading} />}
      </aside>
    </article>
  )
}

/** What the reader noticed: questions first, then problems with their places, then notes. */
function Findings({ reading }: { reading: ShownReading }) {
  const shown = 40
  const total = reading.problemCounts.reduce((sum, { count }) => sum + count, 0)
  return (
    <section className="grid gap-3" aria-label="What the reader noticed">
      {reading.asks.map((ask) => (
        <MarginNote key={ask.message} weight="wrong">
          {ask.message}
        </MarginNote>
      ))}
      {total > 0 && (
        <h2 className="label m-0">
          {total} {total === 1 ? "place needs" : "places need"} a look
        </h2>
      )}
      {reading.problems.slice(0, shown).map((problem, index) => (
        <MarginNote key={index} weight="caution">
          {problem.message}
        </MarginNote>
      ))}
      {total > shown && <p className="m-0 text-soft">The first {shown} are shown.</p>}
      {reading.notes.length > 0 && <h2 className="label m-0">How it was read</h2>}
      {reading.notes.map((note) => (
        <p key={note.code} className="m-0 text-soft">
          {note.message}
        </p>
      ))}
      {reading.lineAccount && (
        <p className="m-0 text-soft">
          {reading.lineAccount.physical} lines: {reading.lineAccount.rows} rows, {reading.lineAccount.headers}{" "}
          header, {reading.lineAccount.comments} comments, {reading.lineAccount.blanks} blank,{" "}
          {reading.lineAccount.setAside} set aside.
        </p>
      )}
    </section>
  )
}
