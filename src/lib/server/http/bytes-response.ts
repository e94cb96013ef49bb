import { contentDisposition } from "./content-disposition"

/**
 * Stored bytes with their checksum as entity tag; 304 when the client has them. What came from a spec never runs: the
 * policy allows nothing.
 *
 * @see RFC 9110, section 13.1.2
 */
export function bytesResponse(
  request: Request,
  bytes: Uint8Array,
  {
    type,
    sha256,
    fileName,
    download = false,
  }: { type: string; sha256: string; fileName: string; download?: boolean },
): Response {
  const headers = {
    etag: `"${sha256}"`,
    "cache-control": "private, no-cache",
    "content-security-policy":
      "default-src 'none'; style-src 'unsafe-inline'; font-src data:; img-src data:; sandbox",
  }
  if (request.headers.get("if-none-match") === headers.etag)
    return new Response(null, { status: 304, headers })
  return new Response(bytes as Uint8Array<ArrayBuffer>, {
    headers: {
      ...headers,
      "content-type": type,
      "content-length": String(bytes.length),
      "content-disposition": contentDisposition(download ? "attachment" : "inline", fileName),
    },
  })
}
