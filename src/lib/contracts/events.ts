import { z } from "zod"
import { defineContract } from "./contract"
import { manuscriptParams, personName, timestamp } from "./fields"

export const eventAnswer = z.object({
  id: z.int(),
  at: timestamp,
  person: personName.nullable(),
  kind: z.string(),
  subject: z.string().nullable(),
  data: z.unknown(),
})
export type EventAnswer = z.output<typeof eventAnswer>

export const listHistory = defineContract({
  id: "listHistory",
  method: "GET",
  path: "/api/v1/manuscripts/{manuscriptId}/history",
  summary: "Who did what when, newest first, in pages.",
  access: { who: "member", action: "history.read" },
  params: manuscriptParams,
  query: z.object({
    before: z.coerce.number().int().optional(),
    limit: z.coerce.number().int().min(1).max(200).default(50),
  }),
  status: 200,
  answer: z.object({ items: z.array(eventAnswer), next: z.int().nullable() }),
})

export const exportHistory = defineContract({
  id: "exportHistory",
  method: "GET",
  path: "/api/v1/manuscripts/{manuscriptId}/history.csv",
  summary: "The whole history as CSV, oldest first.",
  access: { who: "member", action: "history.read" },
  params: manuscriptParams,
  status: 200,
  answer: "text/csv",
})

export const followEvents = defineContract({
  id: "followEvents",
  method: "GET",
  path: "/api/v1/manuscripts/{manuscriptId}/events",
  summary:
    "What happens in a manuscript as it happens, as server-sent events; with Last-Event-ID what came after that one first.",
  access: { who: "member", action: "manuscript.read" },
  params: manuscriptParams,
  status: 200,
  answer: "text/event-stream",
})

export const eventContracts = [listHistory, exportHistory, followEvents] as const
