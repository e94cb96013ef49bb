import { listSignIns as contract, signOutEverywhere } from "@/lib/contracts/accounts"
import { endpoint } from "@/lib/server/http/endpoint"
import { endSignIns, listSignIns } from "@/lib/server/services/accounts/sign-ins"

export const GET = endpoint(contract, async ({ db, actor }) => ({ items: await listSignIns(db, actor) }))

export const DELETE = endpoint(signOutEverywhere, ({ db, actor }) => endSignIns(db, actor.person.id))
