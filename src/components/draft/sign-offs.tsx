import { Button } from "@/components/parts/button"
import { HeatMark } from "@/components/parts/heat"
import { When } from "@/components/parts/when"
import type { DraftAnswer } from "@/lib/contracts/drafts"

/** Who signed off on what is pinned, who has not, and one's own sign-off. */
export function SignOffs({
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
