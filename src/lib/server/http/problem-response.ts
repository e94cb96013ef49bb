import { Problem, problemDocument, problems } from "@/lib/contracts/problems"

interface DatabaseError extends Error {
  readonly code: string
  readonly constraint?: string
}

function isDatabaseError(error: unknown): error is DatabaseError {
  return error instanceof Error && typeof (error as { code?: unknown }).code === "string"
}

/** SpecError belongs to figure-specs, which this layer does not import; its name and issues are enough. */
function isSpecError(error: unknown): error is Error & { issues: Problem["errors"] } {
  return error instanceof Error && error.name === "SpecError" && "issues" in error
}

const passing = new Set(["40001", "40P01", "53300", "57P01", "57P03", "ECONNREFUSED", "ECONNRESET"])

/** The problem that an error amounts to; undefined for one that nobody foresaw. */
export function problemOfError(error: unknown): Problem | undefined {
  if (error instanceof Problem) return error
  if (isSpecError(error))
    return new Problem("invalid-figure-spec", "The figure cannot be made as written.", error.issues)
  if (!isDatabaseError(error)) return undefined
  if (error.code === "AQ423") return new Problem("locked", error.message)
  if (error.code === "AQ409") return new Problem("conflict", error.message)
  if (error.code === "23505") return new Problem("name-taken")
  if (passing.has(error.code)) return new Problem("unavailable", undefined, [], { "retry-after": "2" })
  return undefined
}

/** Answers with application/problem+json (RFC 9457). An error that nobody foresaw is logged under the request id. */
export function problemResponse(error: unknown, requestId: string): Response {
  let problem = problemOfError(error)
  if (problem === undefined) {
    console.error(`request ${requestId} failed:`, error)
    problem = new Problem("internal", `The request id is ${requestId}.`)
  }
  return new Response(JSON.stringify(problemDocument(problem, requestId)), {
    status: problems[problem.code].status,
    headers: {
      "content-type": "application/problem+json",
      "cache-control": "no-store",
      ...(problem.code === "not-signed-in" ? { "www-authenticate": "Bearer" } : {}),
      ...problem.headers,
    },
  })
}
