import { useQuery, useQueryClient } from "@tanstack/react-query"
import { useState } from "react"
import { Button, ButtonLink } from "@/components/parts/button"
import { EmptyPlace } from "@/components/parts/empty-place"
import { Field, TextArea } from "@/components/parts/field"
import { GraveDialog } from "@/components/parts/dialog"
import { HeatMark, HeatStrip } from "@/components/parts/heat"
import { MarginNote } from "@/components/parts/note"
import { ProgressLine } from "@/components/parts/progress-line"
import { When } from "@/components/parts/when"
import { call, sentenceOf } from "@/lib/client/call"
import { Island } from "@/lib/client/island"
import { useLiveChanges } from "@/lib/client/live"
import {
  type DraftAnswer,
  getDraft,
  lockDraft,
  openDraft,
  pinFigures,
  signOff,
  withdrawSignOff,
} from "@/lib/contracts/drafts"
import type { FigureAnswer } from "@/lib/contracts/figures"
import { roleMay, type Role } from "@/lib/domain/policy"
import { PinList } from "./pin-list"

interface Props {
  readonly manuscriptId: string
  readonly role: Role
  readonly personId: string
  readonly draft: DraftAnswer
  readonly figures: readonly FigureAnswer[]
}

/** A draft as a form that one signs: what exactly, who, when; and the lock. */
export function DraftPage(props: Props) {
  return (
    <Island>
      <Draft {...props} />
    </Island>
  )
}

function Draft({ manuscriptId, role, personId, draft: initial, figures }: Props) {
  const params = { manuscriptId, draftNumber: initial.number }
  const client = useQueryClient()
  const { data: draft } = useQuery({
    queryKey: ["draft", initial.id],
    queryFn: async () => (await call(getDraft, { params })).data,
    initialData: initial,
  })
  const [problem, setProblem] = useState<string | null>(null)
  useLiveChanges(manuscriptId, () => void client.invalidateQueries())
  const act = async (doing: () => Promise<unknown>): Promise<boolean> => {
    setProblem(null)
    try {
      await doing()
      return true
    } catch (error) {
      setProblem(sentenceOf(error))
      return false
    } finally {
      await client.invalidateQueries()
    }
  }
  const isOpen = draft.state === "open"
  const mine = draft.signOffs.find((entry) => entry.person.id === personId)
  const base = `/manuscripts/${manuscriptId}`

  return (
    <article className="sheet">
      <header className="across">
        <h1 className="m-0 text-title">{draft.title}</h1>
        <p className="mt-2 mb-4 flex flex-wrap items-baseline gap-x-5 text-small">
          {isOpen ? (
            <HeatMark heat="work">open</HeatMark>
          ) : (
            <HeatMark heat="locked">
              locked {draft.lockedAt && <When at={draft.lockedAt} />} by {draft.lockedBy?.name}
            </HeatMark>
          )}
          {draft.digest && (
            <span className="text-soft">
              digest <span className="font-mono">{draft.digest.slice(0, 16)}</span>
            </span>
          )}
        </p>
        <HeatStrip
          title="Pinned figures"
          segments={draft.figures.map((figure) => ({
            heat: isOpen
              ? figure.ready
                ? figure.version < figure.newest
                  ? "stale"
                  : "settled"
                : "work"
              : "locked",
            label: `${figure.figureTitle || figure.figureName}, version ${figure.version}`,
            href: `${base}/figures/${figure.figureId}/versions/${figure.version}`,
          }))}
        />
      </header>
      <div className="grid min-w-0 content-start gap-8">
        {problem && <MarginNote weight="wrong">{problem}</MarginNote>}
        {figures.length === 0 ? (
          <EmptyPlace
            title="There is no figure to pin yet."
            action={<ButtonLink href={`${base}/figures/new`}>Build a figure</ButtonLink>}
          />
        ) : (
          <PinList
            draft={draft}
            figures={figures}
            base={base}
            mayPin={isOpen && roleMay(role, "draft.pin")}
            onPin={(pins) =>
              act(() =>
                call(pinFigures, {
                  params,
                  body: { figures: pins },
                  headers: { "if-match": `"${draft.revision}"` },
                }),
              )
            }
          />
        )}
        <SignOffs
          draft={draft}
          signedBefore={mine !== undefined && mine.stale}
          signed={mine !== undefined && !mine.stale}
          maySign={isOpen && roleMay(role, "draft.sign-off") && draft.digest !== null}
          onSign={() => void act(() => call(signOff, { params, body: { digest: draft.digest! } }))}
          onWithdraw={() => void act(() => call(withdrawSignOff, { params }))}
        />
      </div>
      <aside className="grid content-start gap-6 text-small" aria-label="Lock and bundle">
        {isOpen && roleMay(role, "draft.lock") && draft.digest && (
          <LockPlace
            draft={draft}
            onLock={(order) =>
              act(() => call(lockDraft, { params, body: { ...order, digest: draft.digest! } }))
            }
          />
        )}
        {!isOpen && <BundlePlace draft={draft} address={`/api/v1${base}/drafts/${draft.number}/bundle`} />}
        {!isOpen && roleMay(role, "draft.open") && (
          <section className="grid gap-2">
            <h2 className="label m-0">After the submission</h2>
            <p className="m-0">The next draft starts from this one; nothing here changes.</p>
            <div>
              <Button
                onPress={() =>
                  void act(async () => {
                    const { data } = await call(openDraft, { params: { manuscriptId } })
                    location.assign(`${base}/drafts/${data.number}`)
                  })
                }
              >
                Open Draft {draft.number + 1}
              </Button>
            </div>
          </section>
        )}
        {draft.lockReason && (
          <MarginNote weight="note">
            Locked before everything was settled, because: {draft.lockReason}
          </MarginNote>
        )}
      </aside>
    </article>
  )
}

function SignOffs({
  draft,
  signed,
  signedBefore,
  maySign,
  onSign,
  onWithdraw,
}: {
  draft: DraftAnswer
  signed: boolean
  signedBefore: boolean
  maySign: boolean
  onSign: () => void
  onWithdraw: () => void
}) {
  return (
    <section>
      <h2 className="m-0 text-lead">Sign-offs</h2>
      <ul className="m-0 mt-2 grid list-none gap-1 p-0">
        {draft.signOffs.map((entry) => (
          <li key={entry.person.id}>
            <HeatMark heat={entry.stale ? "stale" : "settled"}>
              {entry.person.name}, <When at={entry.at} />
              {entry.stale && ": signed an earlier state"}
            </HeatMark>
          </li>
        ))}
        {draft.state === "open" &&
          draft.waitingFor
            .filter((person) => !draft.signOffs.some((entry) => entry.person.id === person.id))
            .map((person) => (
              <li key={person.id}>
                <HeatMark heat="work">{person.name} has not signed off</HeatMark>
              </li>
            ))}
      </ul>
      {maySign && (
        <div className="measure mt-4 grid gap-2">
          <p className="m-0 font-serif">
            {signed
              ? "You have signed off on exactly what is pinned above. If anything changes, your sign-off becomes stale."
              : `You approve the figures, numbers, data and captions pinned above${signedBefore ? ", which have changed since you signed" : ""}.`}
          </p>
          <div>
            {signed ? (
              <Button look="quiet" onPress={onWithdraw}>
                Withdraw my sign-off
              </Button>
            ) : (
              <Button look="act" onPress={onSign}>
                Sign off {draft.title}
              </Button>
            )}
          </div>
        </div>
      )}
    </section>
  )
}

function LockPlace({
  draft,
  onLock,
}: {
  draft: DraftAnswer
  onLock: (order: { confirm: string; reason?: string }) => Promise<boolean>
}) {
  const [isAsking, setAsking] = useState(false)
  const [confirm, setConfirm] = useState("")
  const [reason, setReason] = useState("")
  const open = [
    ...(draft.waitingFor.length > 0
      ? [`not signed off: ${draft.waitingFor.map(({ name }) => name).join(", ")}`]
      : []),
    ...(draft.openMustSettle > 0 ? [`threads to settle: ${draft.openMustSettle}`] : []),
  ]
  const unready = draft.figures.filter((figure) => !figure.ready)
  const lock = async () => {
    const done = await onLock({ confirm, ...(reason.trim() ? { reason } : {}) })
    if (done) setAsking(false)
  }
  return (
    <section className="grid gap-2">
      <h2 className="label m-0">Lock</h2>
      <p className="m-0">
        At submission the draft, its figure versions and their data are frozen for good, in the database
        itself.
      </p>
      {open.map((point) => (
        <MarginNote key={point} weight="caution">
          {point}
        </MarginNote>
      ))}
      {unready.length > 0 && (
        <MarginNote weight="wrong">
          No proof yet: {unready.map((figure) => figure.figureName).join(", ")}.
        </MarginNote>
      )}
      <div>
        <Button look="grave" isDisabled={unready.length > 0} onPress={() => setAsking(true)}>
          Lock {draft.title}
        </Button>
      </div>
      <GraveDialog title={`Lock ${draft.title}`} isOpen={isAsking} onClose={() => setAsking(false)}>
        <form
          className="grid gap-4"
          onSubmit={(event) => {
            event.preventDefault()
            void lock()
          }}
        >
          <p className="m-0 font-serif">
            {draft.figures.length} {draft.figures.length === 1 ? "figure" : "figures"}, digest{" "}
            <span className="font-mono">{draft.digest?.slice(0, 16)}</span>. Nobody can undo this; changes
            need the next draft.
          </p>
          {open.length > 0 && (
            <TextArea
              label="Why lock although not everything is settled"
              hint={open.join("; ")}
              value={reason}
              onChange={(event) => setReason(event.target.value)}
            />
          )}
          <Field
            label={`Type “${draft.title}” to confirm`}
            value={confirm}
            autoComplete="off"
            onChange={(event) => setConfirm(event.target.value)}
          />
          <div>
            <Button
              look="grave"
              type="submit"
              isDisabled={confirm.trim() !== draft.title || (open.length > 0 && reason.trim() === "")}
            >
              Lock {draft.title} for good
            </Button>
          </div>
        </form>
      </GraveDialog>
    </section>
  )
}

function BundlePlace({ draft, address }: { draft: DraftAnswer; address: string }) {
  const { bundle } = draft
  return (
    <section className="grid gap-2">
      <h2 className="label m-0">Bundle</h2>
      {bundle?.state === "done" ? (
        <>
          <p className="m-0">
            Artwork, captions, macros, data, specs and results with their checksums,{" "}
            {((bundle.size ?? 0) / 1e6).toFixed(1)} MB. Anyone can verify it without this product’s database.
          </p>
          <div>
            <ButtonLink look="act" href={address} download>
              Download the bundle
            </ButtonLink>
          </div>
          <p className="m-0 break-all text-soft">
            SHA-256 <span className="font-mono">{bundle.sha256}</span>
          </p>
        </>
      ) : bundle?.state === "failed" ? (
        <MarginNote weight="wrong">{bundle.failure}</MarginNote>
      ) : (
        <ProgressLine what="Making the bundle" />
      )}
    </section>
  )
}
