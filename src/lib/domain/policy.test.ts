import { describe, expect, test } from "vitest"
import { type Action, actions, roleMay, roles, scopeMay } from "./policy"

const all = Object.keys(actions) as Action[]

// The table of roles in docs: a corresponding author everything; a co-author uploads, makes figures, comments, resolves and
// signs off; a reader looks and comments.
describe("roleMay", () => {
  test("a corresponding author may do everything", () =>
    expect(all.filter((action) => !roleMay("corresponding-author", action))).toEqual([]))
  test("a co-author may do everything but manage people, the manuscript and its drafts", () =>
    expect(all.filter((action) => !roleMay("co-author", action)).sort()).toEqual([
      "draft.lock",
      "draft.open",
      "manuscript.edit",
      "people.manage",
    ]))
  test("a reader looks, comments and leaves", () =>
    expect(all.filter((action) => roleMay("reader", action) && !action.endsWith(".read"))).toEqual([
      "people.leave",
      "comment.write",
    ]))
  test("every member may read", () =>
    expect(
      all.filter((action) => action.endsWith(".read") && !roles.every((role) => roleMay(role, action))),
    ).toEqual([]))
})

describe("scopeMay", () => {
  test("read covers what reads, and nothing else", () =>
    expect(all.filter((action) => scopeMay("read", action))).toEqual(
      all.filter((action) => action.endsWith(".read")),
    ))
  test("upload covers pushing data and what that needs", () =>
    expect(all.filter((action) => scopeMay("upload", action))).toEqual([
      "manuscript.read",
      "dataset.read",
      "dataset.upload",
    ]))
  test("all covers everything", () => expect(all.every((action) => scopeMay("all", action))).toBe(true))
})
