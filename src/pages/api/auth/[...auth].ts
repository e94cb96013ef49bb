import type { APIRoute } from "astro"
import { AstroAuth } from "@/lib/server/auth/auth-astro.js"
import { authOptions } from "@/lib/server/auth/auth-options"
import { atPublicUrl } from "@/lib/server/http/at-public-url"

/**
 * The identity provider's round trip, and nothing else of Auth.js: passwords, sign-out and the session have endpoints of
 * our own, which count attempts and ask the sign_in rows.
 */
export const ALL: APIRoute = async (context) => {
  const open =
    (context.request.method === "POST" && context.params.auth === "signin/oidc") ||
    (context.request.method === "GET" && context.params.auth === "callback/oidc")
  if (!open) return new Response(null, { status: 404 })
  const request = atPublicUrl(context.request)
  const { GET } = AstroAuth(authOptions(request.headers.get("user-agent") ?? ""))
  const response = await GET({ cookies: context.cookies, request })
  return response ?? new Response(null, { status: 404 })
}
