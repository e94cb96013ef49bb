import { leaveManuscript } from "@/lib/contracts/people"
import { endpoint } from "@/lib/server/http/endpoint"
import { endMembership } from "@/lib/server/services/people/members"

export const DELETE = endpoint(leaveManuscript, ({ db, actor, params }) =>
  endMembership(db, {
    manuscriptId: params.manuscriptId,
    personId: actor.person.id,
    by: actor.person.id,
  }),
)
