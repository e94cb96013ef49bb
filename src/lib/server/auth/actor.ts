import type { TokenScope } from "@/lib/domain/policy"

/** Who is asking: a person, and how they proved it. */
export interface Actor {
  readonly person: { readonly id: string; readonly name: string; readonly email: string }
  readonly by:
    { readonly kind: "sign-in"; readonly id: string } | { readonly kind: "token"; readonly id: string }
  /** What a token may do; a sign-in in the browser has `all`. */
  readonly scope: TokenScope
}
