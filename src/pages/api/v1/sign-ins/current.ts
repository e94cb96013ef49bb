import { signOut } from "@/lib/contracts/accounts"
import { forgetCookie, sessionCookiesOf } from "@/lib/server/auth/session-cookie"
import { endpoint } from "@/lib/server/http/endpoint"
import { endSignIns } from "@/lib/server/services/accounts/sign-ins"

export const DELETE = endpoint(signOut, async ({ db, actor, request }) => {
  await endSignIns(db, actor.person.id, actor.by.id)
  const response = new Response(null, { status: signOut.status })
  for (const name of sessionCookiesOf(request)) response.headers.append("set-cookie", forgetCookie(name))
  return response
})
