import { z } from "zod"
import { computationStates, renderingFormats } from "@/lib/domain/states"
import { figureSpec } from "@specs/figure-spec"
import { defineContract } from "./contract"
import { id, manuscriptParams, personName, timestamp } from "./fields"

export const figureParams = manuscriptParams.extend({ figureId: id })
export const figureVersionParams = figureParams.extend({ number: z.coerce.number().int().min(1) })
const figureName = z
  .string()
  .regex(/^[a-z0-9][a-z0-9-]{0,79}$/, "A figure's name is lower-case letters, digits and dashes.")
const caption = z.string().max(10_000)

export const interval = z.object({ level: z.number(), low: z.number(), high: z.number(), type: z.string() })
export const quantity = z
  .object({
    name: z.string(),
    value: z.number(),
    standardError: z.number().nullable(),
    interval: interval.nullable(),
    text: z.string(),
    tex: z.string(),
  })
  .loose()
export const statisticalWarning = z.object({
  code: z.string(),
  severity: z.enum(["note", "caution", "severe"]),
  message: z.string(),
  where: z.string(),
})
const curveKey = z.union([z.number(), z.string()]).nullable()
export const resultsDocument = z.object({
  panels: z.array(
    z.object({
      kind: z.string(),
      curves: z.array(z.object({ curve: curveKey, quantities: z.array(quantity) })),
      quantities: z.array(quantity),
      warnings: z.array(statisticalWarning),
    }),
  ),
})

export const computationAnswer = z.object({
  state: z.enum(computationStates),
  /** Share of the work that is done, 0 to 1, and what is being done. */
  progress: z.object({ share: z.number(), what: z.string() }).nullable(),
  failure: z
    .object({
      message: z.string(),
      errors: z.array(z.object({ pointer: z.string(), code: z.string(), message: z.string() })).optional(),
    })
    .nullable(),
})

export const figureVersionInList = z.object({
  id,
  number: z.int(),
  message: z.string(),
  author: personName,
  createdAt: timestamp,
  basedOn: z.int().nullable(),
  computation: computationAnswer,
  /** Threads that are not resolved. */
  openThreads: z.int(),
  /** Numbers of the drafts that pin it, and whether one of them is locked. */
  pinnedIn: z.array(z.int()),
  locked: z.boolean(),
})
export type FigureVersionInList = z.output<typeof figureVersionInList>

export const figureAnswer = z.object({
  id,
  name: z.string(),
  title: z.string(),
  caption: z.string(),
  position: z.int(),
  revision: z.int(),
  createdAt: timestamp,
  /** Newest first. */
  versions: z.array(figureVersionInList),
})
export type FigureAnswer = z.output<typeof figureAnswer>

export const figureVersionAnswer = figureVersionInList.extend({
  figureId: id,
  spec: figureSpec,
  inputs: z.array(
    z.object({
      dataset: z.string(),
      number: z.int(),
      sha256: z.string(),
      /** A newer accepted version of the dataset exists. */
      newerExists: z.boolean(),
    }),
  ),
  results: resultsDocument.nullable(),
  resultsSha256: z.string().nullable(),
  /** The statistics part of the caption, made from spec and results. */
  sentence: z.string(),
  alternativeText: z.string().nullable(),
  renderings: z.array(
    z.object({
      format: z.enum(renderingFormats),
      dpi: z.int().nullable(),
      sha256: z.string(),
      size: z.int(),
    }),
  ),
})
export type FigureVersionAnswer = z.output<typeof figureVersionAnswer>

const base = "/api/v1/manuscripts/{manuscriptId}/figures"

export const listFigures = defineContract({
  id: "listFigures",
  method: "GET",
  path: base,
  summary: "The figures of a manuscript in their order, with their versions.",
  access: { who: "member", action: "figure.read" },
  params: manuscriptParams,
  status: 200,
  answer: z.object({ items: z.array(figureAnswer) }),
})

export const createFigure = defineContract({
  id: "createFigure",
  method: "POST",
  path: base,
  summary: "Add a figure at the end; its first version is saved separately.",
  access: { who: "member", action: "figure.edit" },
  params: manuscriptParams,
  body: z
    .object({ name: figureName, title: z.string().trim().max(500).default(""), caption: caption.default("") })
    .strict(),
  status: 201,
  answer: figureAnswer,
  problems: ["invalid-request", "name-taken"],
  headers: { ETag: "Revision for If-Match." },
})

export const getFigure = defineContract({
  id: "getFigure",
  method: "GET",
  path: `${base}/{figureId}`,
  summary: "One figure with its versions.",
  access: { who: "member", action: "figure.read" },
  params: figureParams,
  status: 200,
  answer: figureAnswer,
  headers: { ETag: "Revision for If-Match." },
})

export const changeFigure = defineContract({
  id: "changeFigure",
  method: "PATCH",
  path: `${base}/{figureId}`,
  summary: "Change title or caption.",
  access: { who: "member", action: "figure.edit" },
  params: figureParams,
  body: z.object({ title: z.string().trim().max(500).optional(), caption: caption.optional() }).strict(),
  status: 200,
  answer: figureAnswer,
  problems: ["invalid-request", "stale-revision", "revision-required"],
  headers: { ETag: "Revision for If-Match." },
})

export const saveFigureVersion = defineContract({
  id: "saveFigureVersion",
  method: "POST",
  path: `${base}/{figureId}/versions`,
  summary:
    "Save a spec as the next version. It pins the newest accepted version of each dataset, or the ones named.",
  access: { who: "member", action: "figure.edit" },
  params: figureParams,
  body: z
    .object({
      spec: z.unknown(),
      message: z.string().trim().max(2000).default(""),
      /** Number of the version it was made from; the newest one unless it says so. */
      basedOn: z.int().min(1).nullable().optional(),
      /** Dataset versions by dataset name. */
      pins: z.record(z.string(), z.int().min(1)).default({}),
    })
    .strict(),
  status: 201,
  answer: figureVersionAnswer,
  problems: ["invalid-request", "invalid-figure-spec", "conflict"],
})

export const getFigureVersion = defineContract({
  id: "getFigureVersion",
  method: "GET",
  path: `${base}/{figureId}/versions/{number}`,
  summary: "One version: spec, pinned data, results, state of its proof.",
  access: { who: "member", action: "figure.read" },
  params: figureVersionParams,
  status: 200,
  answer: figureVersionAnswer,
})

export const getArtwork = defineContract({
  id: "getArtwork",
  method: "GET",
  path: `${base}/{figureId}/versions/{number}/artwork/{format}`,
  summary: "The proof in one format, at its printed size; with download=1 as an attachment.",
  access: { who: "member", action: "figure.read" },
  params: figureVersionParams.extend({ format: z.enum(renderingFormats) }),
  query: z.object({ download: z.enum(["0", "1"]).default("0") }),
  status: 200,
  answer: "image/svg+xml",
  headers: { ETag: "SHA-256 of the bytes." },
})

export const getResults = defineContract({
  id: "getResults",
  method: "GET",
  path: `${base}/{figureId}/versions/{number}/results`,
  summary: "results.json as it was hashed, byte for byte.",
  access: { who: "member", action: "figure.read" },
  params: figureVersionParams,
  status: 200,
  answer: "application/json",
  headers: { ETag: "SHA-256 of the bytes." },
})

export const getSeries = defineContract({
  id: "getSeries",
  method: "GET",
  path: `${base}/{figureId}/versions/{number}/series.csv`,
  summary: "The numbers of one drawn series as CSV; with several curves the first column names the curve.",
  access: { who: "member", action: "figure.read" },
  params: figureVersionParams,
  query: z.object({
    /** Counted from 1. */
    panel: z.coerce.number().int().min(1).default(1),
    /** "mean", "fit", "band" …; the first series of the panel when it is left out. */
    series: z.string().max(100).optional(),
  }),
  status: 200,
  answer: "text/csv",
  problems: ["invalid-request"],
})

export const cancelComputation = defineContract({
  id: "cancelComputation",
  method: "POST",
  path: `${base}/{figureId}/versions/{number}/cancel`,
  summary: "Stop computing a version.",
  access: { who: "member", action: "figure.edit" },
  params: figureVersionParams,
  status: 200,
  answer: figureVersionAnswer,
  problems: ["conflict"],
})

export const computeAgain = defineContract({
  id: "computeAgain",
  method: "POST",
  path: `${base}/{figureId}/versions/{number}/compute`,
  summary: "Compute a version again after it failed or was cancelled.",
  access: { who: "member", action: "figure.edit" },
  params: figureVersionParams,
  status: 200,
  answer: figureVersionAnswer,
  problems: ["conflict"],
})

export const figureContracts = [
  listFigures,
  createFigure,
  getFigure,
  changeFigure,
  saveFigureVersion,
  getFigureVersion,
  getArtwork,
  getResults,
  getSeries,
  cancelComputation,
  computeAgain,
] as const
