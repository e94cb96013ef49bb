import { Button } from "@/components/parts/button"
import { HeatMark } from "@/components/parts/heat"
import type { DraftAnswer } from "@/lib/contracts/drafts"
import type { FigureAnswer } from "@/lib/contracts/figures"

interface Pin {
  readonly figureId: string
  readonly version: number
  readonly caption?: string
}

/** Which version of each figure the draft holds, in order; a change goes out at once. */
export function PinList({
  draft,
  figures,
  base,
  mayPin,
  onPin,
}: {
  draft: DraftAnswer
  figures: readonly FigureAnswer[]
  base: string
  mayPin: boolean
  onPin: (pins: Pin[]) => Promise<unknown>
}) {
  const pins: Pin[] = draft.figures.map(({ figureId, version, caption }) => ({ figureId, version, caption }))
  const unpinned = figures.filter((figure) => !pins.some((pin) => pin.figureId === figure.id))
  const repin = (figureId: string, version: number | null) =>
    onPin(
      pins.flatMap((pin) =>
        pin.figureId === figureId ? (version === null ? [] : [{ figureId, version }]) : [pin],
      ),
    )
  const move = (index: number, by: number) => {
    const moved = pins.slice()
    const [pin] = moved.splice(index, 1)
    moved.splice(index + by, 0, pin!)
    return onPin(moved)
  }
  return (
    <section>
      <h2 className="m-0 text-lead">What is pinned</h2>
      {draft.figures.length === 0 && (
        <p className="text-soft">Nothing yet. Pin the versions that the paper shall show.</p>
      )}
      <ol className="m-0 mt-2 list-none p-0">
        {draft.figures.map((entry, index) => {
          const figure = figures.find((candidate) => candidate.id === entry.figureId)
          return (
            <li
              key={entry.figureId}
              className="grid gap-x-6 gap-y-1 border-b border-hairline py-3 sm:grid-cols-[1fr_auto]"
            >
              <div>
                <span className="mr-2 text-soft">Figure {index + 1}</span>
                <a
                  href={`${base}/figures/${entry.figureId}/versions/${entry.version}`}
                  className="font-serif"
                >
                  {entry.figureTitle || entry.figureName}
                </a>
                <div className="text-small">
                  {!entry.ready ? (
                    <HeatMark heat="work">version {entry.version}, its proof is not there</HeatMark>
                  ) : entry.version < entry.newest ? (
                    <HeatMark heat="stale">
                      version {entry.version}; version {entry.newest} is newer
                    </HeatMark>
                  ) : (
                    <HeatMark heat={draft.state === "locked" ? "locked" : "settled"}>
                      version {entry.version}
                    </HeatMark>
                  )}
                </div>
              </div>
              {mayPin && (
                <div className="flex flex-wrap items-baseline gap-4 text-small">
                  <label className="flex items-baseline gap-2">
                    <span className="text-soft">version</span>
                    <select
                      value={entry.version}
                      onChange={(event) => void repin(entry.figureId, Number(event.target.value))}
                      className="min-h-6 rounded-sheet border border-rule bg-raised"
                    >
                      {figure?.versions.map((version) => (
                        <option key={version.number} value={version.number}>
                          {version.number}
                        </option>
                      ))}
                    </select>
                  </label>
                  <Button look="quiet" isDisabled={index === 0} onPress={() => void move(index, -1)}>
                    Earlier
                  </Button>
                  <Button
                    look="quiet"
                    isDisabled={index === draft.figures.length - 1}
                    onPress={() => void move(index, 1)}
                  >
                    Later
                  </Button>
                  <Button look="quiet" onPress={() => void repin(entry.figureId, null)}>
                    Unpin
                  </Button>
                </div>
              )}
            </li>
          )
        })}
      </ol>
      {mayPin &&
        unpinned
          .filter((figure) => figure.versions.length > 0)
          .map((figure) => (
            <p key={figure.id} className="mt-3 mb-0 flex flex-wrap items-baseline gap-3 text-small">
              <span className="font-serif">{figure.title || figure.name}</span>
              <Button
                onPress={() =>
                  void onPin([...pins, { figureId: figure.id, version: figure.versions[0]!.number }])
                }
              >
                Pin version {figure.versions[0]!.number}
              </Button>
            </p>
          ))}
    </section>
  )
}
