import { z } from "zod"
import { roles } from "@/lib/domain/policy"
import { draftStates } from "@/lib/domain/states"
import { defineContract } from "./contract"
import { id, manuscriptParams, timestamp } from "./fields"

const title = z.string().trim().min(1).max(500)
const abstract = z.string().trim().max(10_000)
const profile = z.string().trim().min(1).max(60)

/** A manuscript in a list of one's manuscripts. */
export const manuscriptInList = z.object({
  id,
  title: z.string(),
  role: z.enum(roles),
  people: z.int(),
  figures: z.int(),
  /** The newest draft, or null before the first one. */
  draft: z.object({ id, number: z.int(), title: z.string(), state: z.enum(draftStates) }).nullable(),
  updatedAt: timestamp,
})
export type ManuscriptInList = z.output<typeof manuscriptInList>

export const manuscriptAnswer = z.object({
  id,
  title: z.string(),
  abstract: z.string(),
  profile: z.string(),
  revision: z.int(),
  role: z.enum(roles),
  createdAt: timestamp,
  updatedAt: timestamp,
})
export type ManuscriptAnswer = z.output<typeof manuscriptAnswer>

export const listManuscripts = defineContract({
  id: "listManuscripts",
  method: "GET",
  path: "/api/v1/manuscripts",
  summary: "The manuscripts one takes part in, last changed first.",
  access: { who: "signed-in", scope: "read" },
  status: 200,
  answer: z.object({ items: z.array(manuscriptInList) }),
})

export const createManuscript = defineContract({
  id: "createManuscript",
  method: "POST",
  path: "/api/v1/manuscripts",
  summary: "Start a manuscript; one becomes its corresponding author. Draft 1 is opened with it.",
  access: { who: "signed-in", scope: "all" },
  body: z.object({ title, abstract: abstract.default(""), profile: profile.optional() }).strict(),
  status: 201,
  answer: manuscriptAnswer,
  problems: ["invalid-request"],
  headers: { ETag: "Revision for If-Match.", Location: "Address of the manuscript." },
})

export const getManuscript = defineContract({
  id: "getManuscript",
  method: "GET",
  path: "/api/v1/manuscripts/{manuscriptId}",
  summary: "A manuscript.",
  access: { who: "member", action: "manuscript.read" },
  params: manuscriptParams,
  status: 200,
  answer: manuscriptAnswer,
  headers: { ETag: "Revision for If-Match." },
})

export const changeManuscript = defineContract({
  id: "changeManuscript",
  method: "PATCH",
  path: "/api/v1/manuscripts/{manuscriptId}",
  summary: "Change title, abstract or journal profile.",
  access: { who: "member", action: "manuscript.edit" },
  params: manuscriptParams,
  body: z
    .object({ title: title.optional(), abstract: abstract.optional(), profile: profile.optional() })
    .strict(),
  status: 200,
  answer: manuscriptAnswer,
  problems: ["invalid-request", "stale-revision", "revision-required"],
  headers: { ETag: "Revision for If-Match." },
})

export const manuscriptContracts = [
  listManuscripts,
  createManuscript,
  getManuscript,
  changeManuscript,
] as const
