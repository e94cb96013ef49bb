import { changePassword as contract } from "@/lib/contracts/accounts"
import { endpoint } from "@/lib/server/http/endpoint"
import { changePassword } from "@/lib/server/services/accounts/profile"

export const PUT = endpoint(contract, ({ db, actor, body }) => changePassword(db, actor, body))
