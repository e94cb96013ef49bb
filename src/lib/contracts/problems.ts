/**
 * Every problem the API answers with (RFC 9457): status, title and what to do. `detail` and `errors` of a single answer
 * say what happened and where; `action` says what the reader can do about it.
 */
export const problems = {
  "invalid-request": {
    status: 400,
    title: "The request is not valid",
    action: "Correct the places listed in errors and send it again.",
  },
  "not-signed-in": {
    status: 401,
    title: "Sign in first",
    action: "Sign in, or send a token: Authorization: Bearer ...",
  },
  "wrong-credentials": {
    status: 401,
    title: "E-mail or password is wrong",
    action: "Check both, or reset the password.",
  },
  "not-allowed": {
    status: 403,
    title: "Your role does not allow this",
    action: "Ask the corresponding author.",
  },
  "scope-too-narrow": {
    status: 403,
    title: "This token's scope does not cover the request",
    action: "Use a token with a wider scope.",
  },
  "bad-origin": {
    status: 403,
    title: "The request comes from another site",
    action: "Use the product's own pages, or a token.",
  },
  "not-found": { status: 404, title: "There is nothing here", action: "Check the address." },
  "method-not-allowed": {
    status: 405,
    title: "This address does not take that method",
    action: "See /api/v1/openapi.json.",
  },
  conflict: {
    status: 409,
    title: "This does not fit the present state",
    action: "Load the present state and decide again.",
  },
  "name-taken": { status: 409, title: "This name is in use", action: "Choose another name." },
  "link-used": { status: 410, title: "This link has been used or has expired", action: "Ask for a new one." },
  "stale-revision": {
    status: 412,
    title: "It has changed since you loaded it",
    action: "Load it again and repeat the change.",
  },
  "too-large": {
    status: 413,
    title: "This is larger than the limit",
    action: "Send less; the limits are in docs/api.md.",
  },
  "unsupported-media-type": {
    status: 415,
    title: "This kind of content is not read here",
    action: "See /api/v1/openapi.json.",
  },
  "invalid-figure-spec": {
    status: 422,
    title: "The figure spec cannot be used",
    action: "Correct the places listed in errors.",
  },
  "unreadable-table": {
    status: 422,
    title: "The table cannot be read",
    action: "Correct the file or the reading recipe.",
  },
  locked: { status: 423, title: "This is locked", action: "Open the next draft to change it." },
  "revision-required": {
    status: 428,
    title: "Say which revision you are changing",
    action: "Send If-Match with the ETag you loaded.",
  },
  "too-many-requests": {
    status: 429,
    title: "Too many attempts",
    action: "Wait for the time in Retry-After.",
  },
  internal: {
    status: 500,
    title: "Something failed on the server",
    action: "Try again; if it stays, report the request id.",
  },
  unavailable: { status: 503, title: "The server cannot answer now", action: "Try again in a moment." },
} as const satisfies Record<string, { status: number; title: string; action: string }>

export type ProblemCode = keyof typeof problems

/** One place in a request that is wrong; `pointer` is a JSON pointer into the body, or names a parameter. */
export interface ProblemIssue {
  readonly pointer: string
  readonly code: string
  readonly message: string
}

/** The body of `application/problem+json`. */
export interface ProblemDocument {
  readonly type: string
  readonly title: string
  readonly status: number
  readonly code: ProblemCode
  readonly detail: string
  readonly action: string
  readonly requestId?: string
  readonly errors?: readonly ProblemIssue[]
}

/** Thrown by services, turned into an answer in one place (server/http). */
export class Problem extends Error {
  constructor(
    readonly code: ProblemCode,
    readonly detail: string = problems[code].title,
    readonly errors: readonly ProblemIssue[] = [],
    readonly headers: Readonly<Record<string, string>> = {},
  ) {
    super(`${code}: ${detail}`)
    this.name = "Problem"
  }
}

/** The document that is sent for a problem. */
export function problemDocument(problem: Problem, requestId?: string): ProblemDocument {
  const { status, title, action } = problems[problem.code]
  return {
    type: `/problems/${problem.code}`,
    title,
    status,
    code: problem.code,
    detail: problem.detail,
    action,
    ...(requestId === undefined ? {} : { requestId }),
    ...(problem.errors.length === 0 ? {} : { errors: problem.errors }),
  }
}
