import { requestPasswordReset as contract } from "@/lib/contracts/accounts"
import { endpoint } from "@/lib/server/http/endpoint"
import { requestPasswordReset } from "@/lib/server/services/accounts/password-reset"

export const POST = endpoint(contract, ({ db, body, clientAddress }) =>
  requestPasswordReset(db, { ...body, clientAddress }),
)
