import { changeMe, getMe } from "@/lib/contracts/accounts"
import { endpoint } from "@/lib/server/http/endpoint"
import { changeProfile, readProfile } from "@/lib/server/services/accounts/profile"

export const GET = endpoint(getMe, ({ db, actor }) => readProfile(db, actor.person.id))

export const PATCH = endpoint(changeMe, ({ db, actor, body }) => changeProfile(db, actor.person.id, body))
