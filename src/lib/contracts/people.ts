import { z } from "zod"
import { roles } from "@/lib/domain/policy"
import { defineContract } from "./contract"
import { email, id, manuscriptParams, personName, timestamp } from "./fields"

const role = z.enum(roles)
const memberParams = manuscriptParams.extend({ personId: id })
const linkSecret = z.string().min(20).max(200)

export const memberAnswer = z.object({
  personId: id,
  name: z.string(),
  email: z.string(),
  orcid: z.string().nullable(),
  role,
  since: timestamp,
})
export type MemberAnswer = z.output<typeof memberAnswer>

export const listMembers = defineContract({
  id: "listMembers",
  method: "GET",
  path: "/api/v1/manuscripts/{manuscriptId}/members",
  summary: "Who takes part, in which role.",
  access: { who: "member", action: "people.read" },
  params: manuscriptParams,
  status: 200,
  answer: z.object({ items: z.array(memberAnswer) }),
})

export const changeMember = defineContract({
  id: "changeMember",
  method: "PATCH",
  path: "/api/v1/manuscripts/{manuscriptId}/members/{personId}",
  summary: "Give a member another role. A manuscript keeps a corresponding author.",
  access: { who: "member", action: "people.manage" },
  params: memberParams,
  body: z.object({ role }).strict(),
  status: 200,
  answer: memberAnswer,
  problems: ["invalid-request", "not-found", "conflict"],
})

export const removeMember = defineContract({
  id: "removeMember",
  method: "DELETE",
  path: "/api/v1/manuscripts/{manuscriptId}/members/{personId}",
  summary: "Remove a member; what they wrote stays.",
  access: { who: "member", action: "people.manage" },
  params: memberParams,
  status: 204,
  answer: null,
  problems: ["not-found", "conflict"],
})

export const leaveManuscript = defineContract({
  id: "leaveManuscript",
  method: "DELETE",
  path: "/api/v1/manuscripts/{manuscriptId}/members/me",
  summary: "Leave a manuscript; its last corresponding author has to hand over first.",
  access: { who: "member", action: "people.leave" },
  params: manuscriptParams,
  status: 204,
  answer: null,
  problems: ["conflict"],
})

export const invitationAnswer = z.object({
  id,
  email: z.string(),
  role,
  message: z.string(),
  invitedBy: personName,
  createdAt: timestamp,
  expiresAt: timestamp,
})

export const listInvitations = defineContract({
  id: "listInvitations",
  method: "GET",
  path: "/api/v1/manuscripts/{manuscriptId}/invitations",
  summary: "Invitations that wait for an answer.",
  access: { who: "member", action: "people.manage" },
  params: manuscriptParams,
  status: 200,
  answer: z.object({ items: z.array(invitationAnswer) }),
})

export const invite = defineContract({
  id: "invite",
  method: "POST",
  path: "/api/v1/manuscripts/{manuscriptId}/invitations",
  summary: "Invite a person by mail. Inviting the same address again replaces the earlier link.",
  access: { who: "member", action: "people.manage" },
  params: manuscriptParams,
  body: z.object({ email, role, message: z.string().trim().max(2000).default("") }).strict(),
  status: 201,
  answer: invitationAnswer,
  problems: ["invalid-request", "conflict", "too-many-requests"],
})

export const revokeInvitation = defineContract({
  id: "revokeInvitation",
  method: "DELETE",
  path: "/api/v1/manuscripts/{manuscriptId}/invitations/{invitationId}",
  summary: "Take an invitation back; its link stops working.",
  access: { who: "member", action: "people.manage" },
  params: manuscriptParams.extend({ invitationId: id }),
  status: 204,
  answer: null,
  problems: ["not-found"],
})

export const lookAtInvitation = defineContract({
  id: "lookAtInvitation",
  method: "POST",
  path: "/api/v1/invitations/look",
  summary: "What the link of an invitation offers, without using it.",
  access: { who: "public" },
  body: z.object({ token: linkSecret }).strict(),
  status: 200,
  answer: z.object({
    manuscriptTitle: z.string(),
    role,
    email: z.string(),
    invitedBy: z.string(),
    message: z.string(),
    expiresAt: timestamp,
    /** Whether the invited address has an account: then sign in, otherwise open one by accepting. */
    hasAccount: z.boolean(),
  }),
  problems: ["invalid-request", "link-used", "too-many-requests"],
})

export const acceptInvitation = defineContract({
  id: "acceptInvitation",
  method: "POST",
  path: "/api/v1/invitations/accept",
  summary: "Accept by the link: as whoever is signed in, or by opening an account for the invited address.",
  access: { who: "public" },
  body: z
    .object({
      token: linkSecret,
      /** For a new account; not used when signed in. */
      account: z
        .object({ name: z.string().trim().min(1).max(200), password: z.string().min(1).max(1000) })
        .strict()
        .optional(),
    })
    .strict(),
  status: 200,
  answer: z.object({ manuscriptId: id, email: z.string() }),
  problems: ["invalid-request", "link-used", "conflict", "not-signed-in", "too-many-requests"],
})

export const peopleContracts = [
  listMembers,
  changeMember,
  removeMember,
  leaveManuscript,
  listInvitations,
  invite,
  revokeInvitation,
  lookAtInvitation,
  acceptInvitation,
] as const
