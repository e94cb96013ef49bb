import { useState } from "react"
import { Button } from "@/components/parts/button"
import { Field, TextArea } from "@/components/parts/field"
import { call, sentenceOf } from "@/lib/client/call"
import { createFigure } from "@/lib/contracts/figures"

/** A short name from a title: lower case, dashes. */
const slug = (title: string) =>
  title
    .normalize("NFKD")
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, "-")
    .replace(/^-+|-+$/g, "")
    .slice(0, 60)

/** Names a figure; what it shows is chosen on the next page. */
export function NewFigure({ manuscriptId }: { manuscriptId: string }) {
  const [title, setTitle] = useState("")
  const [name, setName] = useState<string | null>(null)
  const [caption, setCaption] = useState("")
  const [problem, setProblem] = useState<string | undefined>()
  const [isSending, setSending] = useState(false)
  const shortName = name ?? slug(title)
  const create = async () => {
    setSending(true)
    try {
      const { data } = await call(createFigure, {
        params: { manuscriptId },
        body: { name: shortName, title, caption },
      })
      location.assign(`/manuscripts/${manuscriptId}/figures/${data.id}`)
    } catch (error) {
      setProblem(sentenceOf(error))
      setSending(false)
    }
  }
  return (
    <div className="sheet">
      <form
        className="measure grid gap-4"
        onSubmit={(event) => {
          event.preventDefault()
          void create()
        }}
      >
        <h1 className="m-0 text-head">A new figure</h1>
        <Field label="Title" required value={title} onChange={(event) => setTitle(event.target.value)} />
        <Field
          label="Short name"
          hint="For file names: lower-case letters, digits, dashes."
          value={shortName}
          problem={problem}
          onChange={(event) => setName(event.target.value)}
        />
        <TextArea
          label="Caption"
          hint="TeX between $ signs. The statistics are added by the product."
          value={caption}
          onChange={(event) => setCaption(event.target.value)}
        />
        <div>
          <Button look="act" type="submit" isDisabled={isSending || shortName === ""}>
            Add the figure
          </Button>
        </div>
      </form>
    </div>
  )
}
