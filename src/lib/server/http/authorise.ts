import type { Contract } from "@/lib/contracts/contract"
import { Problem } from "@/lib/contracts/problems"
import { roleMay, scopeMay, type TokenScope } from "@/lib/domain/policy"
import type { Actor } from "@/lib/server/auth/actor"
import type { Db } from "@/lib/server/db/client"
import { findMembership, type Membership } from "@/lib/server/db/memberships"

/** Scopes that cover an endpoint outside any manuscript; null stands for a sign-in in the browser. */
const wideEnough: Record<TokenScope, readonly TokenScope[]> = {
  read: ["read", "upload", "all"],
  upload: ["upload", "all"],
  all: ["all"],
}

/**
 * Lets an actor through to an endpoint or throws.
 *
 * @returns the membership, for endpoints inside a manuscript
 * @throws Problem `not-signed-in`; `not-found` for a manuscript that the actor may not know of; `not-allowed`;
 *   `scope-too-narrow`
 */
export async function authorise(
  db: Db,
  contract: Contract,
  actor: Actor | null,
  params: Readonly<Record<string, string | undefined>>,
): Promise<Membership | null> {
  const { access } = contract
  if (access.who === "public") return null
  if (actor === null) throw new Problem("not-signed-in")
  if (access.who === "signed-in") {
    const covered =
      actor.by.kind === "sign-in" || (access.scope !== null && wideEnough[access.scope].includes(actor.scope))
    if (!covered) throw new Problem("scope-too-narrow")
    return null
  }
  const manuscriptId = params.manuscriptId
  if (manuscriptId === undefined) throw new Error(`${contract.id} has no manuscriptId in its path`)
  const membership = isUuid(manuscriptId)
    ? await findMembership(db, manuscriptId, actor.person.id)
    : undefined
  if (membership === undefined) throw new Problem("not-found")
  if (!roleMay(membership.role, access.action)) throw new Problem("not-allowed")
  if (!scopeMay(actor.scope, access.action)) throw new Problem("scope-too-narrow")
  return membership
}

function isUuid(text: string): boolean {
  return /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/i.test(text)
}
