import { useQuery, useQueryClient } from "@tanstack/react-query"
import { useState } from "react"
import { MarginNote } from "@/components/parts/note"
import { Plate } from "@/components/parts/plate"
import { ProgressLine } from "@/components/parts/progress-line"
import { call } from "@/lib/client/call"
import { useLiveChanges } from "@/lib/client/live"
import { type FigureAnswer, type FigureVersionAnswer, getFigureVersion } from "@/lib/contracts/figures"

/** The proof of the version that one works from; it appears by itself when it is drawn. */
export function ProofPlate({
  manuscriptId,
  figure,
  version: initial,
}: {
  manuscriptId: string
  figure: FigureAnswer
  version: FigureVersionAnswer | null
}) {
  const client = useQueryClient()
  const [progress, setProgress] = useState<{ what: string; share: number } | null>(null)
  const { data: version } = useQuery({
    queryKey: ["version", figure.id, initial?.number],
    queryFn: async () => {
      const params = { manuscriptId, figureId: figure.id, number: initial!.number }
      return (await call(getFigureVersion, { params })).data
    },
    enabled: initial !== null,
    initialData: initial ?? undefined,
  })
  useLiveChanges(manuscriptId, (change) => {
    if (change.subject !== version?.id) return
    if (change.kind === "figure-version.progress")
      setProgress({ what: change.what ?? "", share: change.share ?? 0 })
    else void client.invalidateQueries()
  })
  if (!version)
    return (
      <p className="m-4 self-center font-serif text-soft">
        The proof at print size is drawn when the first version is saved.
      </p>
    )
  const address = `/api/v1/manuscripts/${manuscriptId}/figures/${figure.id}/versions/${version.number}/artwork/svg`
  if (version.renderings.length > 0)
    return (
      <div>
        <Plate
          src={address}
          alt={version.alternativeText ?? figure.title}
          widthMm={version.spec.size.widthMm}
          heightMm={version.spec.size.heightMm}
          zoom={1}
          footnote={<span>Proof of version {version.number}</span>}
        />
      </div>
    )
  return (
    <div className="m-4">
      {version.computation.state === "failed" ? (
        <MarginNote weight="wrong">{version.computation.failure?.message}</MarginNote>
      ) : (
        <ProgressLine
          what={progress?.what || "Waiting for the worker"}
          done={progress ? Math.round(progress.share * 100) : undefined}
          total={progress ? 100 : undefined}
          unit="%"
        />
      )}
    </div>
  )
}
