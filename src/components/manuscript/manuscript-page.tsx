import { ButtonLink } from "@/components/parts/button"
import { EmptyPlace } from "@/components/parts/empty-place"
import { HeatMark, HeatStrip } from "@/components/parts/heat"
import { MathText } from "@/components/parts/math-text"
import { Plate } from "@/components/parts/plate"
import { When } from "@/components/parts/when"
import type { DatasetAnswer } from "@/lib/contracts/datasets"
import type { DraftAnswer } from "@/lib/contracts/drafts"
import type { FigureAnswer, FigureVersionAnswer } from "@/lib/contracts/figures"
import type { ManuscriptAnswer } from "@/lib/contracts/manuscripts"
import type { MemberAnswer } from "@/lib/contracts/people"
import { roleMay } from "@/lib/domain/policy"
import { quantityText } from "@/components/parts/quantity-view"
import type { Quantity } from "@/lib/domain/quantity"
import { figureState } from "./figure-heat"

export interface ShownFigure {
  readonly figure: FigureAnswer
  /** The pinned version, or the newest one that has been computed. */
  readonly shown: FigureVersionAnswer | null
}

interface Props {
  readonly manuscript: ManuscriptAnswer
  readonly figures: readonly ShownFigure[]
  readonly draft: DraftAnswer | null
  readonly datasets: readonly DatasetAnswer[]
  readonly members: readonly MemberAnswer[]
}

const roleWords = {
  "corresponding-author": "corresponding author",
  "co-author": "co-author",
  reader: "reader",
} as const

/** A manuscript as a sheet: its figures in order, what is said and missing in the margin. */
export function ManuscriptPage({ manuscript, figures, draft, datasets, members }: Props) {
  const base = `/manuscripts/${manuscript.id}`
  const mayEdit = roleMay(manuscript.role, "figure.edit")
  return (
    <article className="sheet">
      <header className="across">
        <h1 className="m-0 max-w-[54rem] text-title">{manuscript.title}</h1>
        <p className="mt-2 mb-5 font-serif text-soft italic">
          {members
            .filter((member) => member.role !== "reader")
            .map((member) => member.name)
            .join(", ")}
        </p>
        <HeatStrip
          title={draft ? `${draft.title}, a segment for each figure` : "Figures"}
          segments={figures.map(({ figure }, index) => {
            const { heat, words } = figureState(figure)
            return { heat, label: `Figure ${index + 1}: ${words}`, href: `#${figure.name}` }
          })}
        />
        {draft && (
          <p className="mt-2 mb-0 flex flex-wrap items-baseline gap-x-5 gap-y-1 text-small">
            <a href={`${base}/drafts/${draft.number}`} className="font-semibold">
              {draft.title}
            </a>
            {draft.state === "locked" ? (
              <HeatMark heat="locked">locked {draft.lockedAt && <When at={draft.lockedAt} />}</HeatMark>
            ) : (
              <HeatMark heat="work">open</HeatMark>
            )}
            <span className="text-soft">
              {draft.figures.length} of {figures.length} {figures.length === 1 ? "figure" : "figures"} pinned
            </span>
            <a href={`${base}/quantities`}>Quantities</a>
            <a href={`${base}/history`}>History</a>
          </p>
        )}
      </header>
      <div>
        {figures.map((entry, index) => (
          <FigureEntry key={entry.figure.id} entry={entry} index={index} base={base} mayEdit={mayEdit} />
        ))}
        {figures.length === 0 && <NoFigures base={base} hasData={datasets.length > 0} mayEdit={mayEdit} />}
        {figures.length > 0 && mayEdit && (
          <p className="mt-10">
            <ButtonLink href={`${base}/figures/new`} look="plain">
              Add a figure
            </ButtonLink>
          </p>
        )}
      </div>
      <aside className="grid content-start gap-8 text-small" aria-label="About this manuscript">
        {draft && draft.state === "open" && <BeforeTheLock draft={draft} base={base} />}
        <Datasets datasets={datasets} base={base} mayUpload={roleMay(manuscript.role, "dataset.upload")} />
        <section>
          <h2 className="label m-0">People</h2>
          <ul className="m-0 mt-1 list-none p-0">
            {members.map((member) => (
              <li key={member.personId}>
                {member.name}, <span className="text-soft">{roleWords[member.role]}</span>
              </li>
            ))}
          </ul>
          <p className="mt-1 mb-0">
            <a href={`${base}/people`}>
              {roleMay(manuscript.role, "people.manage") ? "Invite and manage" : "All people"}
            </a>
          </p>
        </section>
      </aside>
    </article>
  )
}

function FigureEntry({
  entry: { figure, shown },
  index,
  base,
  mayEdit,
}: {
  entry: ShownFigure
  index: number
  base: string
  mayEdit: boolean
}) {
  const { heat, words } = figureState(figure)
  const address = `${base}/figures/${figure.id}`
  const quantities = shown?.results?.panels.flatMap((panel) => panel.quantities) ?? []
  const open = figure.versions.reduce((sum, version) => sum + version.openThreads, 0)
  return (
    <section
      id={figure.name}
      className="grid gap-x-10 gap-y-3 border-b border-hairline py-6 first:pt-2 lg:grid-cols-[minmax(0,1fr)_13rem]"
    >
      <div>
        <h2 className="m-0 text-head">
          <span className="mr-2 font-sans text-lead font-normal text-soft">Figure {index + 1}</span>
          <a
            href={shown ? `${address}/versions/${shown.number}` : address}
            className="no-underline hover:underline"
          >
            {figure.title || figure.name}
          </a>
        </h2>
        {shown?.renderings.some((rendering) => rendering.format === "svg") ? (
          <a
            href={`${address}/versions/${shown.number}`}
            className="block max-w-fit no-underline"
            aria-label={`Version ${shown.number} of ${figure.title || figure.name}`}
          >
            <Plate
              src={`/api/v1${address}/versions/${shown.number}/artwork/svg`}
              alt={shown.alternativeText ?? figure.title}
              widthMm={shown.spec.size.widthMm}
              heightMm={shown.spec.size.heightMm}
            />
          </a>
        ) : (
          <p className="my-6 text-soft">
            {figure.versions.length === 0
              ? "Nothing is drawn yet."
              : "The proof is being made; load the page again in a moment."}
          </p>
        )}
        {figure.caption && (
          <p className="measure m-0 font-serif">
            <MathText text={figure.caption} />
          </p>
        )}
      </div>
      <div className="grid content-start gap-2 text-small lg:pt-2">
        <HeatMark heat={heat}>{words}</HeatMark>
        {shown && (
          <span>
            Version {shown.number}, {shown.author.name}, <When at={shown.createdAt} />
          </span>
        )}
        {open > 0 && <HeatMark heat="work">{open === 1 ? "1 open thread" : `${open} open threads`}</HeatMark>}
        {quantities.length > 0 && (
          <dl className="m-0 grid grid-cols-[auto_auto] justify-start gap-x-3">
            {quantities.map((quantity) => (
              <div key={quantity.name} className="contents">
                <dt className="text-soft">{quantity.name}</dt>
                <dd className="m-0 font-serif tabular-nums">{quantityText(quantity as Quantity)}</dd>
              </div>
            ))}
          </dl>
        )}
        {mayEdit && (
          <span>
            <a href={address} className="inline-block min-h-6">
              {figure.versions.length === 0 ? "Build this figure" : "Edit"}
            </a>
          </span>
        )}
      </div>
    </section>
  )
}

function BeforeTheLock({ draft, base }: { draft: DraftAnswer; base: string }) {
  const unready = draft.figures.filter((figure) => !figure.ready).length
  const points = [
    draft.figures.length === 0 ? "no figure is pinned" : null,
    unready > 0 ? `${unready} pinned without a proof` : null,
    draft.openMustSettle > 0
      ? `${draft.openMustSettle} ${draft.openMustSettle === 1 ? "thread" : "threads"} to settle`
      : null,
    draft.waitingFor.length > 0
      ? `to sign off: ${draft.waitingFor.map((person) => person.name).join(", ")}`
      : null,
  ].filter((point) => point !== null)
  return (
    <section>
      <h2 className="label m-0">Before the lock</h2>
      {points.length === 0 ? (
        <p className="mt-1 mb-0">Nothing is left. {draft.title} can be locked.</p>
      ) : (
        <ul className="m-0 mt-1 list-none p-0">
          {points.map((point) => (
            <li key={point}>
              <HeatMark heat="work">{point}</HeatMark>
            </li>
          ))}
        </ul>
      )}
      <p className="mt-1 mb-0">
        <a href={`${base}/drafts/${draft.number}`}>Pin, sign off, lock</a>
      </p>
    </section>
  )
}

function Datasets({
  datasets,
  base,
  mayUpload,
}: {
  datasets: readonly DatasetAnswer[]
  base: string
  mayUpload: boolean
}) {
  return (
    <section>
      <h2 className="label m-0">Datasets</h2>
      <ul className="m-0 mt-1 grid list-none gap-1 p-0">
        {datasets.map((dataset) => {
          const newest = dataset.versions[0]
          return (
            <li key={dataset.id}>
              <a href={newest ? `${base}/datasets/${dataset.name}/${newest.number}` : `${base}/datasets`}>
                {dataset.name}
              </a>{" "}
              {newest && (
                <span className="text-soft">
                  v{newest.number}, {newest.state === "accepted" ? `${newest.rows} rows` : newest.state}
                </span>
              )}
            </li>
          )
        })}
      </ul>
      <p className="mt-1 mb-0">
        <a href={`${base}/datasets`}>{mayUpload ? "Upload a table" : "All datasets"}</a>
      </p>
    </section>
  )
}

function NoFigures({ base, hasData, mayEdit }: { base: string; hasData: boolean; mayEdit: boolean }) {
  if (!mayEdit) return <EmptyPlace title="No figure has been added yet." />
  return hasData ? (
    <EmptyPlace
      title="The data are there; the first figure is missing."
      action={
        <ButtonLink look="act" href={`${base}/figures/new`}>
          Build a figure
        </ButtonLink>
      }
    >
      A figure is a sentence about a table: what is plotted, averaged, fitted. It is proposed from the
      columns.
    </EmptyPlace>
  ) : (
    <EmptyPlace
      title="A paper starts with its evidence."
      action={
        <ButtonLink look="act" href={`${base}/datasets`}>
          Upload a table
        </ButtonLink>
      }
    >
      Bring the raw table: one row a measurement, a column that numbers the trajectories. CSV, TSV or a
      whitespace table with # headers.
    </EmptyPlace>
  )
}
