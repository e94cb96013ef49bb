import { z } from "zod"
import { defineContract } from "./contract"
import { id, manuscriptParams, personName, timestamp } from "./fields"
import { figureVersionParams } from "./figures"

const body = z.string().trim().min(1, "A comment says something.").max(20_000)
/** A place in the proof, in per cent of its width and height from the top left. */
export const anchor = z
  .object({ x: z.number().min(0).max(100), y: z.number().min(0).max(100), panel: z.int().min(0).optional() })
  .strict()

export const commentAnswer = z.object({
  id,
  author: personName,
  body: z.string(),
  createdAt: timestamp,
  editedAt: timestamp.nullable(),
})

export const threadAnswer = z.object({
  id,
  /** Counted over the figure, for the pin on the plate. */
  versionNumber: z.int(),
  anchor: anchor.nullable(),
  mustSettle: z.boolean(),
  createdBy: personName,
  createdAt: timestamp,
  resolvedAt: timestamp.nullable(),
  resolvedBy: personName.nullable(),
  comments: z.array(commentAnswer),
})
export type ThreadAnswer = z.output<typeof threadAnswer>

const threadParams = manuscriptParams.extend({ threadId: id })
const ofVersion = "/api/v1/manuscripts/{manuscriptId}/figures/{figureId}/versions/{number}/threads"
const ofThread = "/api/v1/manuscripts/{manuscriptId}/threads/{threadId}"

export const listThreads = defineContract({
  id: "listThreads",
  method: "GET",
  path: ofVersion,
  summary: "The threads on a figure version, oldest first.",
  access: { who: "member", action: "comment.read" },
  params: figureVersionParams,
  status: 200,
  answer: z.object({ items: z.array(threadAnswer) }),
})

export const startThread = defineContract({
  id: "startThread",
  method: "POST",
  path: ofVersion,
  summary: "Start a thread, optionally at a place of the proof, optionally to be settled before the lock.",
  access: { who: "member", action: "comment.write" },
  params: figureVersionParams,
  body: z
    .object({ body, anchor: anchor.nullable().default(null), mustSettle: z.boolean().default(false) })
    .strict(),
  status: 201,
  answer: threadAnswer,
  problems: ["invalid-request"],
})

export const addComment = defineContract({
  id: "addComment",
  method: "POST",
  path: `${ofThread}/comments`,
  summary: "Reply in a thread.",
  access: { who: "member", action: "comment.write" },
  params: threadParams,
  body: z.object({ body }).strict(),
  status: 201,
  answer: threadAnswer,
  problems: ["invalid-request"],
})

export const settleThread = defineContract({
  id: "settleThread",
  method: "PATCH",
  path: ofThread,
  summary: "Resolve or reopen a thread, or say whether it must be settled before the lock.",
  access: { who: "member", action: "comment.settle" },
  params: threadParams,
  body: z.object({ resolved: z.boolean().optional(), mustSettle: z.boolean().optional() }).strict(),
  status: 200,
  answer: threadAnswer,
  problems: ["invalid-request"],
})

export const threadContracts = [listThreads, startThread, addComment, settleThread] as const
