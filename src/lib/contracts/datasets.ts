import { z } from "zod"
import { datasetVersionStates } from "@/lib/domain/states"
import { columnRole } from "@specs/schema/data-binding"
import { defineContract } from "./contract"
import { id, manuscriptParams, personName, timestamp } from "./fields"

/** Largest file that is taken, in bytes. */
export const largestUpload = 300 * 1000 * 1000

export const datasetName = z
  .string()
  .regex(
    /^[A-Za-z0-9][A-Za-z0-9._-]{0,79}$/,
    "A dataset's name is letters, digits, dots, dashes and underscores, up to 80 of them.",
  )
const datasetParams = manuscriptParams.extend({ datasetName })
const versionParams = datasetParams.extend({ number: z.coerce.number().int().min(1) })

export const datasetVersionInList = z.object({
  id,
  number: z.int(),
  fileName: z.string(),
  state: z.enum(datasetVersionStates),
  format: z.string().nullable(),
  size: z.int(),
  sha256: z.string(),
  rows: z.int().nullable(),
  uploadedBy: personName,
  uploadedAt: timestamp,
  acceptedAt: timestamp.nullable(),
})
export type DatasetVersionInList = z.output<typeof datasetVersionInList>

export const datasetAnswer = z.object({
  id,
  name: z.string(),
  description: z.string(),
  /** Newest first. */
  versions: z.array(datasetVersionInList),
})
export type DatasetAnswer = z.output<typeof datasetAnswer>

export const datasetColumn = z.object({
  index: z.int(),
  name: z.string(),
  unit: z.string().nullable(),
  symbol: z.string().nullable(),
  role: columnRole.nullable(),
  kind: z.enum(["number", "text"]),
  statistics: z.unknown(),
})
export type DatasetColumn = z.output<typeof datasetColumn>

export const datasetVersionAnswer = datasetVersionInList.extend({
  datasetName: z.string(),
  columns: z.array(datasetColumn),
  /** What the reader saw: preview, notes, problems, questions. Null until it has been read. */
  reading: z.unknown(),
  recipe: z.unknown(),
  failure: z.object({ message: z.string() }).loose().nullable(),
})
export type DatasetVersionAnswer = z.output<typeof datasetVersionAnswer>

export const listDatasets = defineContract({
  id: "listDatasets",
  method: "GET",
  path: "/api/v1/manuscripts/{manuscriptId}/datasets",
  summary: "The datasets of a manuscript with their versions.",
  access: { who: "member", action: "dataset.read" },
  params: manuscriptParams,
  status: 200,
  answer: z.object({ items: z.array(datasetAnswer) }),
})

export const getDataset = defineContract({
  id: "getDataset",
  method: "GET",
  path: "/api/v1/manuscripts/{manuscriptId}/datasets/{datasetName}",
  summary: "One dataset with its versions.",
  access: { who: "member", action: "dataset.read" },
  params: datasetParams,
  status: 200,
  answer: datasetAnswer,
})

const description = z.string().trim().max(10_000)

export const createDataset = defineContract({
  id: "createDataset",
  method: "POST",
  path: "/api/v1/manuscripts/{manuscriptId}/datasets",
  summary: "Name a dataset before its first file; uploading makes it too.",
  access: { who: "member", action: "dataset.upload" },
  params: manuscriptParams,
  body: z.object({ name: datasetName, description: description.default("") }).strict(),
  status: 201,
  answer: datasetAnswer,
  problems: ["invalid-request", "name-taken"],
})

export const changeDataset = defineContract({
  id: "changeDataset",
  method: "PATCH",
  path: "/api/v1/manuscripts/{manuscriptId}/datasets/{datasetName}",
  summary: "Change what is said about a dataset. Its name stays: specs refer to it.",
  access: { who: "member", action: "dataset.accept" },
  params: datasetParams,
  body: z.object({ description }).strict(),
  status: 200,
  answer: datasetAnswer,
  problems: ["invalid-request"],
})

const upload = {
  path: "/api/v1/manuscripts/{manuscriptId}/datasets/{datasetName}/versions",
  access: { who: "member", action: "dataset.upload" },
  params: datasetParams,
  query: z.object({ fileName: z.string().min(1).max(255).optional() }),
  body: "stream",
  status: 201,
  answer: datasetVersionInList,
  problems: ["invalid-request", "too-large", "conflict"],
} as const

export const pushDatasetVersion = defineContract({
  ...upload,
  id: "pushDatasetVersion",
  method: "PUT",
  summary:
    "Upload a file as the next version, as `curl -T` does; the dataset is made when it does not exist. The same bytes as the newest version: 200 and no new one. A Content-Digest (RFC 9530, sha-256) is checked.",
})

export const postDatasetVersion = defineContract({
  ...upload,
  id: "postDatasetVersion",
  method: "POST",
  summary: "The same by POST.",
})

export const getDatasetVersion = defineContract({
  id: "getDatasetVersion",
  method: "GET",
  path: "/api/v1/manuscripts/{manuscriptId}/datasets/{datasetName}/versions/{number}",
  summary: "One version: how it was read, its columns, what could not be read.",
  access: { who: "member", action: "dataset.read" },
  params: versionParams,
  status: 200,
  answer: datasetVersionAnswer,
})

const columnChange = z
  .object({
    index: z.int().min(0),
    name: z.string().trim().min(1).max(200).optional(),
    unit: z.string().trim().max(100).nullable().optional(),
    symbol: z.string().trim().max(200).nullable().optional(),
    role: columnRole.nullable().optional(),
  })
  .strict()

export const changeDatasetVersion = defineContract({
  id: "changeDatasetVersion",
  method: "PATCH",
  path: "/api/v1/manuscripts/{manuscriptId}/datasets/{datasetName}/versions/{number}",
  summary: "Correct names, units, symbols and roles before accepting, or read again by another recipe.",
  access: { who: "member", action: "dataset.accept" },
  params: versionParams,
  body: z
    .object({
      columns: z.array(columnChange).max(4096).optional(),
      recipe: z.record(z.string(), z.json()).optional(),
    })
    .strict(),
  status: 200,
  answer: datasetVersionAnswer,
  problems: ["invalid-request", "conflict", "locked"],
})

export const acceptDatasetVersion = defineContract({
  id: "acceptDatasetVersion",
  method: "POST",
  path: "/api/v1/manuscripts/{manuscriptId}/datasets/{datasetName}/versions/{number}/accept",
  summary:
    "Accept a version as read; it never changes again. Where cells or rows could not be read, say that they count as missing.",
  access: { who: "member", action: "dataset.accept" },
  params: versionParams,
  body: z.object({ treatAsMissing: z.boolean().default(false) }).strict(),
  status: 200,
  answer: datasetVersionAnswer,
  problems: ["invalid-request", "conflict", "locked"],
})

export const cancelReading = defineContract({
  id: "cancelReading",
  method: "POST",
  path: "/api/v1/manuscripts/{manuscriptId}/datasets/{datasetName}/versions/{number}/cancel",
  summary: "Stop the reading of a file. It can be read again by changing its recipe.",
  access: { who: "member", action: "dataset.upload" },
  params: versionParams,
  status: 200,
  answer: datasetVersionAnswer,
  problems: ["conflict"],
})

export const refuseDatasetVersion = defineContract({
  id: "refuseDatasetVersion",
  method: "POST",
  path: "/api/v1/manuscripts/{manuscriptId}/datasets/{datasetName}/versions/{number}/refuse",
  summary: "Refuse a version; its file is kept, figures cannot use it.",
  access: { who: "member", action: "dataset.accept" },
  params: versionParams,
  status: 200,
  answer: datasetVersionAnswer,
  problems: ["conflict", "locked"],
})

export const getOriginal = defineContract({
  id: "getOriginal",
  method: "GET",
  path: "/api/v1/manuscripts/{manuscriptId}/datasets/{datasetName}/versions/{number}/original",
  summary: "The file as it was uploaded, byte for byte.",
  access: { who: "member", action: "dataset.read" },
  params: versionParams,
  status: 200,
  answer: "application/octet-stream",
})

export const getColumns = defineContract({
  id: "getColumns",
  method: "GET",
  path: "/api/v1/manuscripts/{manuscriptId}/datasets/{datasetName}/versions/{number}/columns",
  summary:
    "Columns of an accepted version in one binary answer, all or those named; docs/api.md describes the format.",
  access: { who: "member", action: "dataset.read" },
  params: versionParams,
  /** `names` may be repeated. */
  query: z.object({ names: z.union([z.string(), z.array(z.string()).max(4096)]).optional() }),
  status: 200,
  answer: "application/octet-stream",
  problems: ["invalid-request", "conflict"],
  headers: { ETag: "Changes with the data and the columns asked for." },
})

export const datasetContracts = [
  listDatasets,
  createDataset,
  getDataset,
  changeDataset,
  pushDatasetVersion,
  postDatasetVersion,
  getDatasetVersion,
  changeDatasetVersion,
  acceptDatasetVersion,
  cancelReading,
  refuseDatasetVersion,
  getOriginal,
  getColumns,
] as const
