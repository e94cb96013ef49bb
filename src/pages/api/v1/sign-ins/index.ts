import { signIn } from "@/lib/contracts/accounts"
import { endpoint } from "@/lib/server/http/endpoint"
import { signInByPassword } from "@/lib/server/services/accounts/sign-ins"

export const POST = endpoint(signIn, async ({ db, body, request, clientAddress }) => {
  const userAgent = request.headers.get("user-agent") ?? ""
  const cookies = await signInByPassword(db, { ...body, clientAddress, userAgent })
  const response = new Response(null, { status: signIn.status, headers: { "cache-control": "no-store" } })
  for (const cookie of cookies) response.headers.append("set-cookie", cookie)
  return response
})
