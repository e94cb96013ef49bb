import { z } from "zod"
import { isOrcid } from "@/lib/domain/orcid"
import { tokenScopes } from "@/lib/domain/policy"
import { mailPreferences } from "@/lib/domain/states"
import { defineContract } from "./contract"
import { email, id, timestamp } from "./fields"

/** As it is typed: no trimming; the rules of domain/password-rule are checked where the name and address are known. */
const password = z.string().min(1).max(1000)
const linkSecret = z.string().min(20).max(200)
const personName = z.string().trim().min(1).max(200)
const orcid = z.string().refine(isOrcid, "This is not an ORCID iD: its check digit does not fit.")

const me = z.object({
  id,
  name: z.string(),
  email: z.string(),
  orcid: z.string().nullable(),
  mail: z.enum(mailPreferences),
  hasPassword: z.boolean(),
  createdAt: timestamp,
})

export const signIn = defineContract({
  id: "signIn",
  method: "POST",
  path: "/api/v1/sign-ins",
  summary: "Sign in with e-mail and password; the answer sets the session cookie.",
  access: { who: "public" },
  body: z.object({ email, password }).strict(),
  status: 204,
  answer: null,
  problems: ["invalid-request", "wrong-credentials", "too-many-requests", "bad-origin"],
})

export const signOut = defineContract({
  id: "signOut",
  method: "DELETE",
  path: "/api/v1/sign-ins/current",
  summary: "Sign out of this browser.",
  access: { who: "signed-in", scope: null },
  status: 204,
  answer: null,
})

export const register = defineContract({
  id: "register",
  method: "POST",
  path: "/api/v1/accounts",
  summary: "Ask for an account; a mail brings the link that proves the address.",
  access: { who: "public" },
  body: z.object({ email, name: personName }).strict(),
  status: 202,
  answer: null,
  problems: ["invalid-request", "not-allowed", "too-many-requests"],
})

export const confirmRegistration = defineContract({
  id: "confirmRegistration",
  method: "POST",
  path: "/api/v1/accounts/confirm",
  summary: "Open the account that a link proves, with a password.",
  access: { who: "public" },
  body: z.object({ token: linkSecret, password }).strict(),
  status: 201,
  answer: z.object({ email: z.string() }),
  problems: ["invalid-request", "link-used", "too-many-requests"],
})

export const requestPasswordReset = defineContract({
  id: "requestPasswordReset",
  method: "POST",
  path: "/api/v1/password-resets",
  summary: "Ask for a link to set a new password. The answer is the same for unknown addresses.",
  access: { who: "public" },
  body: z.object({ email }).strict(),
  status: 202,
  answer: null,
  problems: ["invalid-request", "too-many-requests"],
})

export const usePasswordReset = defineContract({
  id: "usePasswordReset",
  method: "POST",
  path: "/api/v1/password-resets/use",
  summary: "Set a new password by a link; signs out everywhere.",
  access: { who: "public" },
  body: z.object({ token: linkSecret, password }).strict(),
  status: 204,
  answer: null,
  problems: ["invalid-request", "link-used", "too-many-requests"],
})

export const getMe = defineContract({
  id: "getMe",
  method: "GET",
  path: "/api/v1/me",
  summary: "Who is signed in.",
  access: { who: "signed-in", scope: "read" },
  status: 200,
  answer: me,
})

export const changeMe = defineContract({
  id: "changeMe",
  method: "PATCH",
  path: "/api/v1/me",
  summary: "Change one's name, ORCID iD or wish for mail.",
  access: { who: "signed-in", scope: null },
  body: z
    .object({
      name: personName.optional(),
      orcid: orcid.nullable().optional(),
      mail: z.enum(mailPreferences).optional(),
    })
    .strict(),
  status: 200,
  answer: me,
  problems: ["invalid-request"],
})

export const changePassword = defineContract({
  id: "changePassword",
  method: "PUT",
  path: "/api/v1/me/password",
  summary: "Change one's password; signs out all other browsers.",
  access: { who: "signed-in", scope: null },
  body: z.object({ current: password.nullable(), next: password }).strict(),
  status: 204,
  answer: null,
  problems: ["invalid-request", "wrong-credentials", "too-many-requests"],
})

const signInAnswer = z.object({
  id,
  current: z.boolean(),
  provider: z.string(),
  userAgent: z.string(),
  createdAt: timestamp,
  lastSeenAt: timestamp,
  expiresAt: timestamp,
})

export const listSignIns = defineContract({
  id: "listSignIns",
  method: "GET",
  path: "/api/v1/me/sign-ins",
  summary: "Browsers in which one is signed in.",
  access: { who: "signed-in", scope: null },
  status: 200,
  answer: z.object({ items: z.array(signInAnswer) }),
})

export const signOutEverywhere = defineContract({
  id: "signOutEverywhere",
  method: "DELETE",
  path: "/api/v1/me/sign-ins",
  summary: "Sign out in every browser, this one included.",
  access: { who: "signed-in", scope: null },
  status: 204,
  answer: null,
})

export const revokeSignIn = defineContract({
  id: "revokeSignIn",
  method: "DELETE",
  path: "/api/v1/me/sign-ins/{signInId}",
  summary: "Sign out in one browser.",
  access: { who: "signed-in", scope: null },
  params: z.object({ signInId: id }),
  status: 204,
  answer: null,
  problems: ["not-found"],
})

const tokenAnswer = z.object({
  id,
  name: z.string(),
  /** The secret's beginning, to recognise it by. */
  prefix: z.string(),
  scope: z.enum(tokenScopes),
  createdAt: timestamp,
  expiresAt: timestamp,
  lastUsedAt: timestamp.nullable(),
})

export const listTokens = defineContract({
  id: "listTokens",
  method: "GET",
  path: "/api/v1/me/tokens",
  summary: "One's tokens that are neither revoked nor expired.",
  access: { who: "signed-in", scope: null },
  status: 200,
  answer: z.object({ items: z.array(tokenAnswer) }),
})

export const createToken = defineContract({
  id: "createToken",
  method: "POST",
  path: "/api/v1/me/tokens",
  summary: "Make a token. Its secret is shown in this answer and never again.",
  access: { who: "signed-in", scope: null },
  body: z
    .object({
      name: z.string().trim().min(1).max(100),
      scope: z.enum(tokenScopes),
      days: z.int().min(1).max(366).default(90),
    })
    .strict(),
  status: 201,
  answer: tokenAnswer.extend({ secret: z.string() }),
  problems: ["invalid-request"],
})

export const revokeToken = defineContract({
  id: "revokeToken",
  method: "DELETE",
  path: "/api/v1/me/tokens/{tokenId}",
  summary: "Revoke a token at once.",
  access: { who: "signed-in", scope: null },
  params: z.object({ tokenId: id }),
  status: 204,
  answer: null,
  problems: ["not-found"],
})

export const accountContracts = [
  signIn,
  signOut,
  register,
  confirmRegistration,
  requestPasswordReset,
  usePasswordReset,
  getMe,
  changeMe,
  changePassword,
  listSignIns,
  signOutEverywhere,
  revokeSignIn,
  listTokens,
  createToken,
  revokeToken,
] as const
