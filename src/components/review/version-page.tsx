import { useQuery, useQueryClient } from "@tanstack/react-query"
import { useState } from "react"
import { versionState } from "@/components/manuscript/figure-heat"
import { Button, ButtonLink } from "@/components/parts/button"
import { HeatMark } from "@/components/parts/heat"
import { MathText } from "@/components/parts/math-text"
import { MarginNote } from "@/components/parts/note"
import { Plate } from "@/components/parts/plate"
import { ProgressLine } from "@/components/parts/progress-line"
import { When } from "@/components/parts/when"
import { ResultsLedger } from "@/components/figure/results-ledger"
import { WarningNotes } from "@/components/figure/warning-notes"
import { call } from "@/lib/client/call"
import { Island } from "@/lib/client/island"
import { useLiveChanges } from "@/lib/client/live"
import type { MathBox } from "@/lib/client/typeset"
import {
  type FigureAnswer,
  type FigureVersionAnswer,
  getFigure,
  getFigureVersion,
} from "@/lib/contracts/figures"
import {
  addComment,
  listThreads,
  settleThread,
  startThread,
  type ThreadAnswer,
} from "@/lib/contracts/threads"
import { roleMay, type Role } from "@/lib/domain/policy"
import { Pins } from "./pins"
import { CommentForm, ThreadView } from "./thread-view"
import { VersionRail } from "@/components/figure/version-rail"

interface Props {
  readonly manuscriptId: string
  readonly role: Role
  readonly figure: FigureAnswer
  readonly version: FigureVersionAnswer
  readonly threads: readonly ThreadAnswer[]
  readonly boxes: Readonly<Record<string, MathBox | null>>
}

/** A figure version to be read and argued about: the plate, its numbers, the threads at its side. */
export function VersionPage({ boxes, ...props }: Props) {
  return (
    <Island boxes={boxes}>
      <Version {...props} />
    </Island>
  )
}

function Version({
  manuscriptId,
  role,
  figure: first,
  version: initial,
  threads: initialThreads,
}: Omit<Props, "boxes">) {
  const place = { manuscriptId, figureId: first.id, number: initial.number }
  const client = useQueryClient()
  const { data: figure } = useQuery({
    queryKey: ["figure", first.id],
    queryFn: async () => (await call(getFigure, { params: place })).data,
    initialData: first,
  })
  const { data: version } = useQuery({
    queryKey: ["version", first.id, initial.number],
    queryFn: async () => (await call(getFigureVersion, { params: place })).data,
    initialData: initial,
  })
  const { data: threads } = useQuery({
    queryKey: ["threads", first.id, initial.number],
    queryFn: async () => (await call(listThreads, { params: place })).data.items,
    initialData: initialThreads as ThreadAnswer[],
  })
  const [progress, setProgress] = useState(version.computation.progress)
  useLiveChanges(manuscriptId, (change) => {
    if (change.kind === "figure-version.progress" && change.subject === version.id)
      setProgress({ share: change.share ?? 0, what: change.what ?? "" })
    else void client.invalidateQueries()
  })
  const [anchor, setAnchor] = useState<{ x: number; y: number } | null>(null)
  const [isPlacing, setPlacing] = useState(false)
  const refresh = () => client.invalidateQueries()
  const base = `/manuscripts/${manuscriptId}`
  const address = `${base}/figures/${figure.id}`
  const { heat, words } = versionState(version, figure.versions[0]?.number === version.number)
  const pinned = threads.filter((thread) => thread.anchor !== null)
  const numberOf = (thread: ThreadAnswer) => (thread.anchor ? pinned.indexOf(thread) + 1 : null)

  return (
    <article className="sheet">
      <header className="across">
        <h1 className="m-0 text-head">{figure.title || figure.name}</h1>
        <p className="mt-1 mb-0 flex flex-wrap items-baseline gap-x-4 text-small">
          <span className="font-semibold">Version {version.number}</span>
          <HeatMark heat={heat}>{words}</HeatMark>
          <span>
            {version.author.name}, <When at={version.createdAt} />
          </span>
          {version.message && <span className="font-serif italic">{version.message}</span>}
        </p>
      </header>
      <div>
        <VersionRail figure={figure} current={version.number} address={address} />
        {version.computation.state === "failed" && (
          <MarginNote weight="wrong">
            {version.computation.failure?.message}{" "}
            {version.computation.failure?.errors
              ?.map((error) => `${error.pointer}: ${error.message}`)
              .join(" ")}
          </MarginNote>
        )}
        {(version.computation.state === "queued" || version.computation.state === "computing") && (
          <ProgressLine
            what={progress?.what || "Waiting for the worker"}
            done={(progress && Math.round(progress.share * 100)) || undefined}
            total={progress ? 100 : undefined}
            unit="%"
          />
        )}
        {version.renderings.length > 0 && (
          <Plate
            src={`/api/v1${address}/versions/${version.number}/artwork/svg`}
            alt={version.alternativeText ?? figure.title}
            widthMm={version.spec.size.widthMm}
            heightMm={version.spec.size.heightMm}
            zoom={1.6}
            footnote={version.renderings.map((rendering) => (
              <a
                key={rendering.format}
                href={`/api/v1${address}/versions/${version.number}/artwork/${rendering.format}?download=1`}
              >
                {rendering.format.toUpperCase()}
              </a>
            ))}
          >
            <Pins
              pins={pinned.map((thread) => ({
                ...thread.anchor!,
                id: thread.id,
                isOpen: thread.resolvedAt === null,
              }))}
              proposed={anchor}
              onPlace={isPlacing ? setAnchor : null}
            />
          </Plate>
        )}
        {figure.caption && (
          <p className="measure font-serif">
            <MathText text={figure.caption} />
          </p>
        )}
        <p className="measure font-serif text-soft">{version.sentence}</p>
        {version.results && <ResultsLedger panels={version.results.panels} />}
        <p className="mt-6 text-small text-soft">
          Data:{" "}
          {version.inputs.map((input, index) => (
            <span key={input.dataset}>
              {index > 0 && ", "}
              <a href={`${base}/datasets/${input.dataset}/${input.number}`}>
                {input.dataset}, version {input.number}
              </a>
              {input.newerExists && " (a newer version is accepted)"}
            </span>
          ))}
          {version.resultsSha256 && (
            <>
              . Results <span className="font-mono">{version.resultsSha256.slice(0, 12)}</span>
            </>
          )}
        </p>
        {roleMay(role, "figure.edit") && (
          <ButtonLink href={`${address}?from=${version.number}`}>Edit from this version</ButtonLink>
        )}
      </div>
      <aside className="grid content-start gap-5" aria-label="Threads and warnings">
        <h2 className="label m-0">
          {threads.length === 0
            ? "No thread yet"
            : threads.length === 1
              ? "1 thread"
              : `${threads.length} threads`}
        </h2>
        {threads.map((thread) => (
          <ThreadView
            key={thread.id}
            thread={thread}
            pin={numberOf(thread)}
            maySettle={roleMay(role, "comment.settle")}
            onReply={async (body) => {
              await call(addComment, { params: { manuscriptId, threadId: thread.id }, body: { body } })
              await refresh()
            }}
            onSettle={async (resolved) => {
              await call(settleThread, { params: { manuscriptId, threadId: thread.id }, body: { resolved } })
              await refresh()
            }}
          />
        ))}
        <div className="grid gap-2">
          <CommentForm
            label={anchor ? "A new thread, at the marked place" : "A new thread"}
            act="Start thread"
            mayRequireSettling
            onSend={async (body, mustSettle) => {
              await call(startThread, { params: place, body: { body, mustSettle, anchor } })
              setAnchor(null)
              setPlacing(false)
              await refresh()
            }}
          />
          <Button
            look="quiet"
            onPress={() => {
              setPlacing(!isPlacing)
              setAnchor(isPlacing ? null : { x: 50, y: 50 })
            }}
          >
            {isPlacing ? "Speak of the whole figure" : "Point at a place in the figure"}
          </Button>
        </div>
        {version.results && (
          <WarningNotes warnings={version.results.panels.flatMap((panel) => panel.warnings)} />
        )}
      </aside>
    </article>
  )
}
