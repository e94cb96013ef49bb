const METADATA = /^\s*(?:[#%!;]|\/\/)+\s*([^=:]{1,64}?)\s*[:=]\s*(.*)$/

/** Name and value of a comment such as `# T = 0.35`, or null. Such a line is never a header. */
export function metadataOf(line: string): { readonly key: string; readonly value: string } | null {
  const match = METADATA.exec(line)
  return match && match[1] !== "" ? { key: match[1]!, value: match[2]!.trim() } : null
}

export const isMetadata = (line: string): boolean => metadataOf(line) !== null
