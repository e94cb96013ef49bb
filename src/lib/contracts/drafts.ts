import { z } from "zod"
import { bundleStates, draftStates } from "@/lib/domain/states"
import { defineContract } from "./contract"
import { id, manuscriptParams, personName, timestamp } from "./fields"
import { quantity } from "./figures"

const draftParams = manuscriptParams.extend({ draftNumber: z.coerce.number().int().min(1) })
const base = "/api/v1/manuscripts/{manuscriptId}/drafts"

export const pinAnswer = z.object({
  position: z.int(),
  figureId: id,
  figureName: z.string(),
  figureTitle: z.string(),
  version: z.int(),
  /** The newest version of the figure, when the pin is behind it. */
  newest: z.int(),
  caption: z.string(),
  ready: z.boolean(),
})

export const draftAnswer = z.object({
  id,
  number: z.int(),
  title: z.string(),
  state: z.enum(draftStates),
  revision: z.int(),
  /** SHA-256 over what is pinned, in hexadecimal; null while nothing is. */
  digest: z.string().nullable(),
  figures: z.array(pinAnswer),
  signOffs: z.array(
    z.object({
      person: personName,
      at: timestamp,
      /** The draft has changed since. */
      stale: z.boolean(),
    }),
  ),
  /** Authors who have not signed off on the present digest. */
  waitingFor: z.array(personName),
  /** Unresolved threads on pinned versions that must be settled. */
  openMustSettle: z.int(),
  /** What stands before the lock: to be fixed, to be given a reason for, or to be known. Empty once it is locked. */
  checks: z.array(
    z.object({
      code: z.string(),
      weight: z.enum(["must-fix", "needs-reason", "caution"]),
      message: z.string(),
      /** Name of the figure it is about, or "draft". */
      where: z.string(),
    }),
  ),
  lockedAt: timestamp.nullable(),
  lockedBy: personName.nullable(),
  lockReason: z.string().nullable(),
  bundle: z
    .object({
      state: z.enum(bundleStates),
      size: z.int().nullable(),
      sha256: z.string().nullable(),
      failure: z.string().nullable(),
    })
    .nullable(),
})
export type DraftAnswer = z.output<typeof draftAnswer>

export const listDrafts = defineContract({
  id: "listDrafts",
  method: "GET",
  path: base,
  summary: "The drafts of a manuscript, newest first.",
  access: { who: "member", action: "draft.read" },
  params: manuscriptParams,
  status: 200,
  answer: z.object({ items: z.array(draftAnswer) }),
})

export const openDraft = defineContract({
  id: "openDraft",
  method: "POST",
  path: base,
  summary: "Open the next draft from the locked one: the same pins, to be changed.",
  access: { who: "member", action: "draft.open" },
  params: manuscriptParams,
  status: 201,
  answer: draftAnswer,
  problems: ["conflict"],
})

export const getDraft = defineContract({
  id: "getDraft",
  method: "GET",
  path: `${base}/{draftNumber}`,
  summary: "One draft: what it pins, who signed off, what stands before the lock.",
  access: { who: "member", action: "draft.read" },
  params: draftParams,
  status: 200,
  answer: draftAnswer,
  headers: { ETag: "Revision for If-Match." },
})

export const pinFigures = defineContract({
  id: "pinFigures",
  method: "PUT",
  path: `${base}/{draftNumber}/figures`,
  summary:
    "Pin figure versions in order, with their captions. Replaces what was pinned; sign-offs become stale.",
  access: { who: "member", action: "draft.pin" },
  params: draftParams,
  body: z
    .object({
      figures: z
        .array(
          z
            .object({ figureId: id, version: z.int().min(1), caption: z.string().max(10_000).optional() })
            .strict(),
        )
        .max(200),
    })
    .strict(),
  status: 200,
  answer: draftAnswer,
  problems: ["invalid-request", "stale-revision", "revision-required", "locked"],
  headers: { ETag: "Revision for If-Match." },
})

export const draftQuantity = z.object({
  quantity,
  figureId: id,
  figureName: z.string(),
  version: z.int(),
  /** Counted from 1. */
  panel: z.int(),
})
export type DraftQuantity = z.output<typeof draftQuantity>

export const listQuantities = defineContract({
  id: "listQuantities",
  method: "GET",
  path: `${base}/{draftNumber}/quantities`,
  summary: "The named numbers of the pinned figures, with the version each comes from.",
  access: { who: "member", action: "draft.read" },
  params: draftParams,
  status: 200,
  answer: z.object({ items: z.array(draftQuantity) }),
})

export const getValuesTex = defineContract({
  id: "getValuesTex",
  method: "GET",
  path: `${base}/{draftNumber}/values.tex`,
  summary: "The named numbers as TeX macros, plain or for the siunitx package.",
  access: { who: "member", action: "draft.read" },
  params: draftParams,
  query: z.object({ form: z.enum(["plain", "siunitx"]).default("plain") }),
  status: 200,
  answer: "application/x-tex",
  problems: ["conflict"],
})

const digest = z.string().regex(/^[0-9a-f]{64}$/, "A digest is 64 hexadecimal digits.")

export const signOff = defineContract({
  id: "signOff",
  method: "POST",
  path: `${base}/{draftNumber}/sign-offs`,
  summary: "Sign off on exactly what the draft pins now, named by its digest.",
  access: { who: "member", action: "draft.sign-off" },
  params: draftParams,
  body: z.object({ digest }).strict(),
  status: 201,
  answer: draftAnswer,
  problems: ["invalid-request", "conflict", "locked"],
})

export const withdrawSignOff = defineContract({
  id: "withdrawSignOff",
  method: "DELETE",
  path: `${base}/{draftNumber}/sign-offs/mine`,
  summary: "Take one's own sign-off back.",
  access: { who: "member", action: "draft.sign-off" },
  params: draftParams,
  status: 204,
  answer: null,
  problems: ["conflict", "locked"],
})

export const lockDraft = defineContract({
  id: "lockDraft",
  method: "POST",
  path: `${base}/{draftNumber}/lock`,
  summary:
    "Lock the draft, its figure versions and their data for good. It is refused while a check must be fixed; checks that need a reason take one.",
  access: { who: "member", action: "draft.lock" },
  params: draftParams,
  body: z.object({ confirm: z.string(), digest, reason: z.string().trim().max(2000).optional() }).strict(),
  status: 200,
  answer: draftAnswer,
  problems: ["invalid-request", "conflict", "locked"],
})

export const getBundle = defineContract({
  id: "getBundle",
  method: "GET",
  path: `${base}/{draftNumber}/bundle`,
  summary: "The bundle of a locked draft, once it has been made.",
  access: { who: "member", action: "bundle.read" },
  params: draftParams,
  status: 200,
  answer: "application/zip",
  problems: ["conflict"],
  headers: { ETag: "SHA-256 of the bytes." },
})

export const draftContracts = [
  listDrafts,
  openDraft,
  getDraft,
  pinFigures,
  listQuantities,
  getValuesTex,
  signOff,
  withdrawSignOff,
  lockDraft,
  getBundle,
] as const
