import Uppy from "@uppy/core"
import XHRUpload from "@uppy/xhr-upload"
import { useEffect, useRef, useState } from "react"
import { Button } from "@/components/parts/button"
import { MarginNote } from "@/components/parts/note"
import { ProgressLine } from "@/components/parts/progress-line"
import { addressOf } from "@/lib/client/call"
import { largestUpload, postDatasetVersion } from "@/lib/contracts/datasets"
import type { ProblemDocument } from "@/lib/contracts/problems"

/** A dataset's name from that of a file: without its endings, in the characters that names take. */
export function nameFromFile(fileName: string): string {
  return (
    fileName
      .replace(/\.(gz|zip)$/i, "")
      .replace(/\.[A-Za-z0-9]{1,5}$/, "")
      .replace(/[^A-Za-z0-9._-]+/g, "-")
      .replace(/^[^A-Za-z0-9]+/, "")
      .slice(0, 80) || "table"
  )
}

interface Sending {
  readonly fileName: string
  readonly sent: number
  readonly total: number
}

function problemOfXhr(xhr: XMLHttpRequest | undefined): string {
  if (!xhr || xhr.status === 0) return "The connection broke off; nothing was stored. Try again."
  try {
    const { detail, errors = [] } = JSON.parse(xhr.responseText) as ProblemDocument
    return [detail, ...errors.map((issue) => issue.message)].join(" ")
  } catch (error) {
    if (!(error instanceof SyntaxError)) throw error
    return `The server answered ${xhr.status} without saying why.`
  }
}

/** The place where a file is dropped or chosen; it goes up as it is, and its page opens when it is there. */
export function TableUpload({ manuscriptId, datasetName }: { manuscriptId: string; datasetName: string }) {
  const [sending, setSending] = useState<Sending | null>(null)
  const [problem, setProblem] = useState<string | null>(null)
  const [isOver, setOver] = useState(false)
  const input = useRef<HTMLInputElement>(null)
  const uppy = useRef<Uppy | null>(null)
  useEffect(() => () => uppy.current?.destroy(), [])

  const send = (file: File) => {
    const name = datasetName.trim() || nameFromFile(file.name)
    const endpoint = addressOf(
      postDatasetVersion,
      { manuscriptId, datasetName: name },
      { fileName: file.name },
    )
    const upload = new Uppy({ restrictions: { maxNumberOfFiles: 1, maxFileSize: largestUpload } }).use(
      XHRUpload,
      {
        endpoint,
        formData: false,
        headers: { "content-type": "application/octet-stream" },
        timeout: 0,
        shouldRetry: () => false,
      },
    )
    uppy.current?.destroy()
    uppy.current = upload
    setProblem(null)
    upload.on("upload-progress", (_, progress) =>
      setSending({
        fileName: file.name,
        sent: progress.bytesUploaded || 0,
        total: progress.bytesTotal ?? file.size,
      }),
    )
    upload.on("upload-success", (_, response) => {
      const { number } = (response.body ?? {}) as { number?: number }
      location.assign(`/manuscripts/${manuscriptId}/datasets/${encodeURIComponent(name)}/${number ?? 1}`)
    })
    upload.on("upload-error", (_, error) => {
      setSending(null)
      const request = (error as { request?: XMLHttpRequest }).request
      setProblem(problemOfXhr(request))
    })
    upload.on("restriction-failed", (_, error) => setProblem(error.message))
    upload.addFile({ name: file.name, data: file, type: file.type || "application/octet-stream" })
    setSending({ fileName: file.name, sent: 0, total: file.size })
    void upload.upload()
  }
  const stop = () => {
    uppy.current?.destroy()
    uppy.current = null
    setSending(null)
  }

  return (
    <div className="grid gap-3">
      <div
        onDragOver={(event) => {
          event.preventDefault()
          setOver(true)
        }}
        onDragLeave={() => setOver(false)}
        onDrop={(event) => {
          event.preventDefault()
          setOver(false)
          const file = event.dataTransfer.files[0]
          if (file) send(file)
        }}
        className={`border border-dashed p-4 ${isOver ? "border-ink bg-sunk" : "border-rule"}`}
      >
        {sending ? (
          <ProgressLine
            what={`Sending ${sending.fileName}`}
            done={Math.round(sending.sent / 1000)}
            total={Math.max(1, Math.round(sending.total / 1000))}
            unit="kB"
            onCancel={stop}
          />
        ) : (
          <div className="grid gap-2">
            <p className="m-0">Drop a file here, up to {largestUpload / 1e6} MB, or</p>
            <div>
              <Button onPress={() => input.current?.click()}>Choose a file</Button>
            </div>
            <input
              ref={input}
              type="file"
              aria-label="Table to upload"
              className="visually-hidden"
              tabIndex={-1}
              onChange={(event) => {
                const file = event.target.files?.[0]
                event.target.value = ""
                if (file) send(file)
              }}
            />
          </div>
        )}
      </div>
      {problem && <MarginNote weight="wrong">{problem}</MarginNote>}
    </div>
  )
}
