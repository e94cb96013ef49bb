import { register } from "@/lib/contracts/accounts"
import { endpoint } from "@/lib/server/http/endpoint"
import { requestRegistration } from "@/lib/server/services/accounts/registration"

export const POST = endpoint(register, ({ db, body, clientAddress }) =>
  requestRegistration(db, { ...body, clientAddress }),
)
