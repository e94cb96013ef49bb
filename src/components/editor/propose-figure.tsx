import { useState } from "react"
import { Button, ButtonLink } from "@/components/parts/button"
import { EmptyPlace } from "@/components/parts/empty-place"
import { Select } from "@/components/parts/field"
import { MarginNote } from "@/components/parts/note"
import { askAnalysis } from "@/lib/client/use-analysis"
import type { FigureAnswer } from "@/lib/contracts/figures"
import { figureSpec, type FigureSpec } from "@specs/figure-spec"
import { listKinds } from "@specs/kinds"
import type { PanelParams } from "@specs/registry"
import type { EditorDataset } from "./editor-page"

/** The start of a figure: which data, which kind; the sentence is proposed from the columns' roles. */
export function ProposeFigure({
  manuscriptId,
  figure,
  datasets,
  worker,
  onProposed,
}: {
  manuscriptId: string
  figure: FigureAnswer
  datasets: readonly EditorDataset[]
  worker: Worker
  onProposed: (spec: FigureSpec) => void
}) {
  const kinds = listKinds()
  const [dataset, setDataset] = useState(datasets[0]?.name ?? "")
  const [kind, setKind] = useState<string>(kinds[0]!.kind)
  const [problem, setProblem] = useState<string | null>(null)
  const propose = async () => {
    const chosen = datasets.find(({ name }) => name === dataset)
    if (!chosen) return
    const answer = await askAnalysis(worker, {
      type: "propose",
      manuscriptId,
      kind: kind as PanelParams["kind"],
      dataset,
      number: chosen.number,
      roles: Object.fromEntries(chosen.columns.flatMap(({ name, role }) => (role ? [[name, role]] : []))),
    })
    if (answer.type === "proposal")
      onProposed(figureSpec.parse({ version: 1, title: figure.title, panels: [answer.panel] }))
    else if (answer.type === "issues") setProblem(answer.issues.map((issue) => issue.message).join(" "))
  }
  if (datasets.length === 0)
    return (
      <div className="sheet">
        <EmptyPlace
          title="No dataset has been accepted yet."
          action={
            <ButtonLink look="act" href={`/manuscripts/${manuscriptId}/datasets`}>
              Upload a table
            </ButtonLink>
          }
        >
          A figure is drawn from an accepted dataset version.
        </EmptyPlace>
      </div>
    )
  return (
    <div className="sheet">
      <div className="measure grid gap-4">
        <h1 className="m-0 text-head">{figure.title || figure.name}</h1>
        <p className="m-0 font-serif">
          Choose what it shows; you change everything afterwards in one sentence.
        </p>
        <Select
          label="Dataset"
          value={dataset}
          onChange={(event) => setDataset(event.target.value)}
          options={datasets.map(({ name, number }) => ({ value: name, label: `${name}, version ${number}` }))}
        />
        <Select
          label="Kind of figure"
          hint={kinds.find((candidate) => candidate.kind === kind)?.description}
          value={kind}
          onChange={(event) => setKind(event.target.value)}
          options={kinds.map((candidate) => ({ value: candidate.kind, label: candidate.title }))}
        />
        {problem && <MarginNote weight="wrong">{problem}</MarginNote>}
        <div>
          <Button look="act" onPress={() => void propose()}>
            Propose the figure
          </Button>
        </div>
      </div>
    </div>
  )
}
