import { useQuery, useQueryClient } from "@tanstack/react-query"
import { useState } from "react"
import { Button, ButtonLink } from "@/components/parts/button"
import { EmptyPlace } from "@/components/parts/empty-place"
import { HeatMark, HeatStrip } from "@/components/parts/heat"
import { MarginNote } from "@/components/parts/note"
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
import { BundlePlace } from "./bundle-place"
import { LockPlace } from "./lock-place"
import { PinList } from "./pin-list"
import { SignOffs } from "./sign-offs"

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
