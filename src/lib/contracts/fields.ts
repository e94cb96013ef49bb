import { z } from "zod"

export { nothing } from "./contract"

/** An identifier as it stands in addresses and answers. */
export const id = z.uuid()

/** A moment in UTC; services hand over a Date, the wire carries ISO 8601. */
export const timestamp = z.preprocess(
  (value) => (value instanceof Date ? value.toISOString() : value),
  z.iso.datetime(),
)

/** E-mail addresses are compared without regard to case and kept as written. */
export const email = z.string().trim().max(254).pipe(z.email())

/** Path parameters of everything below one manuscript. */
export const manuscriptParams = z.object({ manuscriptId: id })

/** A person as others in the same manuscript see them. */
export const personName = z.object({ id, name: z.string() })
