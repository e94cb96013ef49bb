import { changeMember as changeContract, removeMember } from "@/lib/contracts/people"
import { endpoint } from "@/lib/server/http/endpoint"
import { changeMember, endMembership } from "@/lib/server/services/people/members"

export const PATCH = endpoint(changeContract, ({ db, actor, params, body }) =>
  changeMember(db, { ...params, ...body, by: actor.person.id }),
)

export const DELETE = endpoint(removeMember, ({ db, actor, params }) =>
  endMembership(db, { ...params, by: actor.person.id }),
)
