import { useState } from "react"
import { EmptyPlace } from "@/components/parts/empty-place"
import { Field } from "@/components/parts/field"
import { HeatMark, type Heat } from "@/components/parts/heat"
import { Ledger } from "@/components/parts/ledger"
import { When } from "@/components/parts/when"
import type { DatasetAnswer, DatasetVersionInList } from "@/lib/contracts/datasets"
import { TableUpload } from "./table-upload"

export const versionHeat: Record<DatasetVersionInList["state"], { heat: Heat; words: string }> = {
  uploaded: { heat: "work", words: "waiting to be read" },
  reading: { heat: "work", words: "being read" },
  proposed: { heat: "proposed", words: "read, to be accepted" },
  accepted: { heat: "settled", words: "accepted" },
  refused: { heat: "stale", words: "refused" },
  failed: { heat: "work", words: "could not be read" },
}

const megabytes = (size: number) =>
  size < 1e5 ? `${Math.ceil(size / 1e3)} kB` : `${(size / 1e6).toFixed(1)} MB`

/** The datasets of a manuscript and the place where a table is dropped. */
export function DatasetList({
  manuscriptId,
  datasets,
  mayUpload,
  publicUrl,
}: {
  manuscriptId: string
  datasets: readonly DatasetAnswer[]
  mayUpload: boolean
  publicUrl: string
}) {
  const [name, setName] = useState("")
  const base = `/manuscripts/${manuscriptId}/datasets`
  const rows = datasets.flatMap((dataset) => dataset.versions.map((version) => ({ dataset, version })))
  return (
    <div className="sheet">
      <div className="min-w-0">
        <h1 className="mt-0 mb-4 text-title">Datasets</h1>
        <Ledger
          caption="Dataset versions"
          rows={rows}
          rowKey={({ version }) => version.id}
          empty={
            <EmptyPlace title="No table yet.">
              Drop a file on the right: one row a measurement, a header line with names such as{" "}
              <code>t [1/J]</code>.
            </EmptyPlace>
          }
          columns={[
            {
              key: "name",
              heading: "Dataset",
              cell: ({ dataset, version }) => (
                <a href={`${base}/${dataset.name}/${version.number}`}>
                  {dataset.name}, version {version.number}
                </a>
              ),
            },
            {
              key: "state",
              heading: "State",
              cell: ({ version }) => (
                <HeatMark heat={versionHeat[version.state].heat}>{versionHeat[version.state].words}</HeatMark>
              ),
            },
            { key: "rows", heading: "Rows", numeric: true, cell: ({ version }) => version.rows ?? "" },
            {
              key: "size",
              heading: "Size",
              numeric: true,
              wideOnly: true,
              cell: ({ version }) => megabytes(version.size),
            },
            { key: "by", heading: "From", wideOnly: true, cell: ({ version }) => version.uploadedBy.name },
            {
              key: "at",
              heading: "Date",
              wideOnly: true,
              cell: ({ version }) => <When at={version.uploadedAt} />,
            },
          ]}
        />
      </div>
      {mayUpload && (
        <aside className="grid content-start gap-4 text-small" aria-label="Upload">
          <h2 className="label m-0">Upload a table</h2>
          <Field
            label="Dataset"
            hint="An existing name adds a version to it; empty takes the file's name."
            list="dataset-names"
            value={name}
            onChange={(event) => setName(event.target.value)}
          />
          <datalist id="dataset-names">
            {datasets.map((dataset) => (
              <option key={dataset.id} value={dataset.name} />
            ))}
          </datalist>
          <TableUpload manuscriptId={manuscriptId} datasetName={name} />
          <details>
            <summary className="min-h-6 cursor-pointer">Push it from the cluster</summary>
            <p>
              With a token of scope “upload” from <a href="/me">your account</a>:
            </p>
            <pre className="overflow-x-auto bg-sunk p-2 text-fine">
              {`curl -T run.csv \\\n -H "Authorization: Bearer $TOKEN" \\\n ${publicUrl}/api/v1/manuscripts/${manuscriptId}/datasets/NAME/versions`}
            </pre>
          </details>
        </aside>
      )}
    </div>
  )
}
