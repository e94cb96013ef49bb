/** Role of a person in one manuscript; it belongs to the membership, not to the account. */
export const roles = ["corresponding-author", "co-author", "reader"] as const
export type Role = (typeof roles)[number]

/** What a token may do; a browser session has `all`. */
export const tokenScopes = ["read", "upload", "all"] as const
export type TokenScope = (typeof tokenScopes)[number]

const reader: readonly Role[] = ["corresponding-author", "co-author", "reader"]
const author: readonly Role[] = ["corresponding-author", "co-author"]
const corresponding: readonly Role[] = ["corresponding-author"]

/** Every act on a manuscript and who may do it. The only place that decides. */
export const actions = {
  "manuscript.read": reader,
  "manuscript.edit": corresponding,
  "people.read": reader,
  "people.manage": corresponding,
  "people.leave": reader,
  "dataset.read": reader,
  "dataset.upload": author,
  "dataset.accept": author,
  "figure.read": reader,
  "figure.edit": author,
  "comment.read": reader,
  "comment.write": reader,
  "comment.settle": author,
  "draft.read": reader,
  "draft.pin": author,
  "draft.sign-off": author,
  "draft.open": corresponding,
  "draft.lock": corresponding,
  "bundle.read": reader,
  "history.read": reader,
} as const satisfies Record<string, readonly Role[]>

export type Action = keyof typeof actions

/** Acts that a token of scope `upload` may do; `read` may do those whose name ends in `.read`; `all` everything. */
const uploadActions: readonly Action[] = ["manuscript.read", "dataset.read", "dataset.upload"]

/** Whether a role may do an act on its manuscript. */
export function roleMay(role: Role, action: Action): boolean {
  return (actions[action] as readonly Role[]).includes(role)
}

/** Whether a token's scope covers an act; the role has to allow it as well. */
export function scopeMay(scope: TokenScope, action: Action): boolean {
  if (scope === "all") return true
  if (scope === "upload") return uploadActions.includes(action)
  return action.endsWith(".read")
}
