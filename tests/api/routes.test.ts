import { readdirSync, readFileSync } from "node:fs"
import path from "node:path"
import { fileURLToPath } from "node:url"
import { expect, test } from "vitest"
import { contracts } from "@/lib/contracts"

const pages = fileURLToPath(new URL("../../src/pages", import.meta.url))

/** Every method that a file under pages/api/v1 answers, as "GET /api/v1/me". */
function routedMethods(): string[] {
  return readdirSync(path.join(pages, "api/v1"), { recursive: true, encoding: "utf8" })
    .filter((file) => file.endsWith(".ts"))
    .flatMap((file) => {
      const address = `/api/v1/${file}`
        .replace(/\.ts$/, "")
        .replace(/\/index$/, "")
        .replace(/\[(?:\.\.\.)?(\w+)\]/g, "{$1}")
      const source = readFileSync(path.join(pages, "api/v1", file), "utf8")
      return [...source.matchAll(/^export const ([A-Z]+)\b/gm)].map((found) => `${found[1]} ${address}`)
    })
    .sort()
}

test("every route of the API has a contract and every contract a route", () => {
  const contracted = contracts.map((contract) => `${contract.method} ${contract.path}`).sort()
  expect(routedMethods()).toEqual(contracted)
})

test("contracts have ids and addresses of their own", () => {
  for (const key of [
    (c: (typeof contracts)[number]) => c.id,
    (c: (typeof contracts)[number]) => `${c.method} ${c.path}`,
  ])
    expect(new Set(contracts.map(key)).size).toBe(contracts.length)
})

test("a contract about members has the manuscript in its path", () => {
  for (const contract of contracts)
    if (contract.access.who === "member")
      expect(contract.path).toMatch(/^\/api\/v1\/manuscripts\/\{manuscriptId\}(\/|$)/)
})
