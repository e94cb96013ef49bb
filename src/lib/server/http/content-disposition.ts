/**
 * A Content-Disposition with a file name for old and new clients.
 *
 * @see RFC 6266, RFC 8187
 */
export function contentDisposition(kind: "attachment" | "inline", fileName: string): string {
  const plain = fileName.replace(/[^\x20-\x7e]|["\\%]/g, "_")
  const extended = encodeURIComponent(fileName).replace(
    /['()*]/g,
    (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`,
  )
  return `${kind}; filename="${plain}"; filename*=UTF-8''${extended}`
}
