import { ButtonLink } from "@/components/parts/button"
import { MarginNote } from "@/components/parts/note"
import { ProgressLine } from "@/components/parts/progress-line"
import type { DraftAnswer } from "@/lib/contracts/drafts"

/** The bundle of a locked draft: being made, there, or failed. */
export function BundlePlace({ draft, address }: { draft: DraftAnswer; address: string }) {
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
