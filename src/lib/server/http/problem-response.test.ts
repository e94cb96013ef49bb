import { expect, test, vi } from "vitest"
import { Problem } from "@/lib/contracts/problems"
import { problemOfError, problemResponse } from "./problem-response"

const databaseError = (code: string, message = "from the database") =>
  Object.assign(new Error(message), { code })

test("what the database refuses becomes a problem in its own words", () => {
  expect(problemOfError(databaseError("AQ423", "Draft 1 is locked."))).toMatchObject({
    code: "locked",
    detail: "Draft 1 is locked.",
  })
  expect(problemOfError(databaseError("AQ409"))?.code).toBe("conflict")
  expect(problemOfError(databaseError("23505"))?.code).toBe("name-taken")
  expect(problemOfError(databaseError("40P01"))).toMatchObject({
    code: "unavailable",
    headers: { "retry-after": "2" },
  })
})

test("a spec that cannot be used keeps its places", () => {
  const issues = [{ pointer: "/panels/0/fit", code: "x", message: "y" }]
  const error = Object.assign(new Error("z"), { name: "SpecError", issues })
  expect(problemOfError(error)).toMatchObject({ code: "invalid-figure-spec", errors: issues })
})

test("an error that nobody foresaw is logged and answered with the request id alone", async () => {
  const log = vi.spyOn(console, "error").mockReturnValue()
  const response = problemResponse(new Error("the password is hunter2"), "request-1")
  expect(response.status).toBe(500)
  expect(await response.text()).not.toContain("hunter2")
  expect(log.mock.calls[0]?.join(" ")).toContain("request-1")
  log.mockRestore()
})

test("headers of a problem are sent", () => {
  const response = problemResponse(
    new Problem("too-many-requests", "wait", [], { "retry-after": "9" }),
    "request-1",
  )
  expect([response.status, response.headers.get("retry-after")]).toEqual([429, "9"])
})
