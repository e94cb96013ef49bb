import { Problem } from "@/lib/contracts/problems"

const safeMethods = new Set(["GET", "HEAD", "OPTIONS"])

/**
 * Refuses requests that change something and come from another site's page.
 *
 * A token in the Authorization header is not sent by a browser on its own, so such requests pass. Others must come from
 * our own origin when the browser says where from; a request that carries our cookie and does not say is refused.
 *
 * @param publicOrigin scheme, host and port under which people reach the product
 * @throws Problem `bad-origin`
 */
export function refuseOtherOrigins(request: Request, publicOrigin: string): void {
  if (safeMethods.has(request.method)) return
  if (/^bearer\s/i.test(request.headers.get("authorization") ?? "")) return
  const origin = request.headers.get("origin")
  if (origin !== null) {
    if (origin === publicOrigin) return
    throw new Problem("bad-origin", `Requests from ${origin} may not change anything here.`)
  }
  const site = request.headers.get("sec-fetch-site")
  if (site === "same-origin" || (site === null && request.headers.get("cookie") === null)) return
  throw new Problem("bad-origin", "The request does not say that it comes from this product's own pages.")
}
