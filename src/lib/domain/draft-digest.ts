import { canonicalJson } from "./canonical-json"

/** What a sign-off approves of one pinned figure. Checksums in hexadecimal. */
export interface PinnedContent {
  readonly figure: string
  readonly caption: string
  readonly specSha256: string
  readonly resultsSha256: string | null
  /** By dataset name: the checksum of the uploaded file. */
  readonly data: Readonly<Record<string, string>>
}

/**
 * The text whose SHA-256 is a draft's digest: title and everything pinned, in order. Two drafts with one digest have the
 * same figures, numbers, data and captions.
 */
export function draftContent(title: string, figures: readonly PinnedContent[]): string {
  return canonicalJson({ version: 1, title, figures })
}
