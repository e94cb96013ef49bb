import { env } from "@/lib/server/env"

/**
 * The same request under the address that people use. Behind a proxy the server sees another host, and Auth.js builds
 * its redirects from the address that it sees.
 */
export function atPublicUrl(request: Request): Request {
  const { pathname, search } = new URL(request.url)
  const init: RequestInit & { duplex?: "half" } = { method: request.method, headers: request.headers }
  if (request.body !== null) Object.assign(init, { body: request.body, duplex: "half" })
  return new Request(new URL(pathname + search, env().PUBLIC_URL), init)
}
