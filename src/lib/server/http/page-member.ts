import type { APIContext } from "astro"
import { findMembership, type Membership } from "@/lib/server/db/memberships"
import { type Db, getDb } from "@/lib/server/db/client"
import type { Actor } from "@/lib/server/auth/actor"
import { z } from "zod"

export interface PageMember {
  readonly db: Db
  readonly actor: Actor
  readonly manuscriptId: string
  readonly membership: Membership
}

/**
 * Who looks at a page of a manuscript; undefined for whom the page does not exist. The middleware has already sent people
 * who are not signed in to the sign-in page.
 */
export async function findPageMember({
  locals,
  params,
}: Pick<APIContext, "locals" | "params">): Promise<PageMember | undefined> {
  const id = z.uuid().safeParse(params.manuscriptId)
  if (!id.success || locals.actor === null) return undefined
  const db = getDb()
  const membership = await findMembership(db, id.data, locals.actor.person.id)
  return membership && { db, actor: locals.actor, manuscriptId: id.data, membership }
}
