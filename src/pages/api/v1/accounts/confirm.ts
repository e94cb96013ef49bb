import { confirmRegistration as contract } from "@/lib/contracts/accounts"
import { endpoint } from "@/lib/server/http/endpoint"
import { confirmRegistration } from "@/lib/server/services/accounts/registration"

export const POST = endpoint(contract, ({ db, body, clientAddress }) =>
  confirmRegistration(db, { ...body, clientAddress }),
)
