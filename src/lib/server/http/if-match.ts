import { Problem } from "@/lib/contracts/problems"

/** The entity tag of a revision. */
export function revisionTag(revision: number): string {
  return `"${revision}"`
}

/**
 * The revision that a request says it changes (RFC 9110, section 13.1.1).
 *
 * @throws Problem `revision-required` without If-Match; `stale-revision` for one that is not ours
 */
export function requiredRevision(request: Request): number {
  const header = request.headers.get("if-match")
  if (header === null) throw new Problem("revision-required")
  const revision = /^"(\d{1,9})"$/.exec(header.trim())?.[1]
  if (revision === undefined) throw new Problem("stale-revision")
  return Number(revision)
}
