import { expect, test } from "vitest"
import { contracts } from "@/lib/contracts"
import { contractsAt, unroutedProblem } from "./contracts-at"

const idsAt = (path: string) => contractsAt(contracts, path).map((contract) => contract.id)

test("a literal segment wins over a parameter", () => {
  expect(idsAt("/api/v1/manuscripts/1/members/me")).toEqual(["leaveManuscript"])
  expect(idsAt("/api/v1/manuscripts/1/members/2")).toEqual(["changeMember", "removeMember"])
  expect(idsAt("/api/v1/manuscripts//members/2")).toEqual([])
  expect(idsAt("/api/v1")).toEqual([])
})

test("a wrong method is told from an unknown address", () => {
  const wrong = unroutedProblem(contracts, "POST", "/api/v1/me")
  expect([wrong.code, wrong.headers]).toEqual(["method-not-allowed", { allow: "GET, PATCH" }])
  expect(unroutedProblem(contracts, "GET", "/api/v1/nothing").code).toBe("not-found")
})
