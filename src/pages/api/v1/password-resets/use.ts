import { usePasswordReset as contract } from "@/lib/contracts/accounts"
import { endpoint } from "@/lib/server/http/endpoint"
import { usePasswordReset } from "@/lib/server/services/accounts/password-reset"

export const POST = endpoint(contract, ({ db, body, clientAddress }) =>
  usePasswordReset(db, { ...body, clientAddress }),
)
