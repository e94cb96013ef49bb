import { Auth } from "@auth/core"
import { env } from "@/lib/server/env"
import { authOptions } from "./auth-options"
import { isSessionCookie } from "./session-cookie"

/**
 * Signs in with address and password.
 *
 * @returns the cookies that carry the session, or null when the two do not fit
 */
export async function passwordSignIn(
  email: string,
  password: string,
  userAgent: string,
): Promise<readonly string[] | null> {
  const request = new Request(new URL("/api/auth/callback/password", env().PUBLIC_URL), {
    method: "POST",
    body: new URLSearchParams({ email, password }),
  })
  const response = await Auth(request, authOptions(userAgent))
  const cookies = response.headers
    .getSetCookie()
    .filter((cookie) => isSessionCookie(cookie.split("=")[0] ?? "") && !cookie.includes("Max-Age=0"))
  return cookies.length > 0 ? cookies : null
}
