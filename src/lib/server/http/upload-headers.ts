import { Problem } from "@/lib/contracts/problems"

const wrong = (header: string, message: string) =>
  new Problem("invalid-request", undefined, [{ pointer: header, code: "bad-header", message }])

/**
 * The SHA-256 that a client says its body has.
 *
 * @returns null without the header
 * @throws Problem `invalid-request` for a header without a usable sha-256: nothing is taken unchecked by mistake
 * @see RFC 9530, section 2
 */
export function announcedSha256(headers: Headers): Buffer | null {
  const header = headers.get("content-digest")
  if (header === null) return null
  const text = /(?:^|,)\s*sha-256=:([A-Za-z0-9+/=]+):/.exec(header)?.[1]
  const digest = Buffer.from(text ?? "", "base64")
  if (digest.length === 32) return digest
  throw wrong("Content-Digest", "Only sha-256 is checked here: Content-Digest: sha-256=:…:, in base64.")
}

function decoded(text: string): string {
  try {
    return decodeURIComponent(text)
  } catch (error) {
    throw wrong("Content-Disposition", `The file name is not UTF-8: ${(error as Error).message}`)
  }
}

/**
 * The file name in a Content-Disposition, without folders and control characters; undefined where there is none.
 *
 * @see RFC 6266, section 4.3; RFC 8187
 */
export function announcedFileName(headers: Headers): string | undefined {
  const header = headers.get("content-disposition") ?? ""
  const extended = /;\s*filename\*=UTF-8'[^']*'([^;\s]+)/i.exec(header)?.[1]
  const plain = /;\s*filename=(?:"((?:[^"\\]|\\.)*)"|([^;\s]+))/i.exec(header)
  const name = extended ? decoded(extended) : (plain?.[1]?.replace(/\\(.)/g, "$1") ?? plain?.[2])
  return name && plainFileName(name)
}

/** A file name as it is kept: the last part of a path, without control characters, 255 characters at most. */
export function plainFileName(name: string): string | undefined {
  const last = name.split(/[/\\]/).pop() ?? ""
  return last.replace(/[\x00-\x1f\x7f]/g, "").slice(0, 255) || undefined
}
