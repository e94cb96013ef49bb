import { useState } from "react"
import { Button } from "@/components/parts/button"
import { EmptyPlace } from "@/components/parts/empty-place"
import { Field, TextArea } from "@/components/parts/field"
import { HeatMark } from "@/components/parts/heat"
import { MarginNote } from "@/components/parts/note"
import { When } from "@/components/parts/when"
import { call, sentenceOf } from "@/lib/client/call"
import { createManuscript, type ManuscriptInList } from "@/lib/contracts/manuscripts"

/** The manuscripts one takes part in, as the contents page of a journal. */
export function ManuscriptList({ manuscripts }: { manuscripts: readonly ManuscriptInList[] }) {
  const [isStarting, setStarting] = useState(manuscripts.length === 0)
  return (
    <div className="sheet">
      <div>
        <h1 className="mt-0 mb-6 text-title">Manuscripts</h1>
        {manuscripts.length === 0 && (
          <EmptyPlace title="No manuscript yet.">
            Start one for the paper you are writing; its figures, data and drafts live in it. If a co-author
            has started it, ask for an invitation.
          </EmptyPlace>
        )}
        <ol className="m-0 list-none p-0">
          {manuscripts.map((manuscript) => (
            <li
              key={manuscript.id}
              className="grid gap-x-8 gap-y-1 border-b border-hairline py-4 md:grid-cols-[1fr_13rem]"
            >
              <a
                href={`/manuscripts/${manuscript.id}`}
                className="font-serif text-lead no-underline hover:underline"
              >
                {manuscript.title}
              </a>
              <span className="grid content-start text-small">
                {manuscript.draft && (
                  <HeatMark heat={manuscript.draft.state === "locked" ? "locked" : "work"}>
                    {manuscript.draft.title}, {manuscript.draft.state}
                  </HeatMark>
                )}
                <span className="text-soft">
                  {manuscript.figures} {manuscript.figures === 1 ? "figure" : "figures"}, {manuscript.people}{" "}
                  {manuscript.people === 1 ? "person" : "people"}, <When at={manuscript.updatedAt} />
                </span>
              </span>
            </li>
          ))}
        </ol>
      </div>
      <aside className="text-small">
        {isStarting ? (
          <NewManuscript />
        ) : (
          <Button onPress={() => setStarting(true)}>Start a manuscript</Button>
        )}
      </aside>
    </div>
  )
}

function NewManuscript() {
  const [title, setTitle] = useState("")
  const [abstract, setAbstract] = useState("")
  const [problem, setProblem] = useState<string | null>(null)
  const [isSending, setSending] = useState(false)
  const create = async () => {
    setSending(true)
    try {
      const { data } = await call(createManuscript, { body: { title, abstract } })
      location.assign(`/manuscripts/${data.id}`)
    } catch (error) {
      setProblem(sentenceOf(error))
      setSending(false)
    }
  }
  return (
    <form
      className="grid gap-3"
      onSubmit={(event) => {
        event.preventDefault()
        void create()
      }}
    >
      <h2 className="label m-0">A new manuscript</h2>
      <Field label="Title" required value={title} onChange={(event) => setTitle(event.target.value)} />
      <TextArea
        label="Abstract"
        hint="May follow later."
        value={abstract}
        onChange={(event) => setAbstract(event.target.value)}
      />
      {problem && <MarginNote weight="wrong">{problem}</MarginNote>}
      <Button look="act" type="submit" isDisabled={isSending || title.trim() === ""}>
        Start this manuscript
      </Button>
    </form>
  )
}
