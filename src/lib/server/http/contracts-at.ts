import type { Contract } from "@/lib/contracts/contract"
import { Problem } from "@/lib/contracts/problems"

/** The contracts whose path template fits a path; literal segments win over parameters, as in the router. */
export function contractsAt(contracts: readonly Contract[], path: string): readonly Contract[] {
  const segments = path.split("/")
  const fitting = contracts.filter((contract) => {
    const template = contract.path.split("/")
    return (
      template.length === segments.length &&
      template.every((part, at) => (/^\{.+\}$/.test(part) ? segments[at] !== "" : part === segments[at]))
    )
  })
  const literals = (contract: Contract) =>
    contract.path.split("/").filter((part) => !part.startsWith("{")).length
  const most = Math.max(...fitting.map(literals))
  return fitting.filter((contract) => literals(contract) === most)
}

/** The problem of a request that no route took: a known address with another method, or no address of ours. */
export function unroutedProblem(contracts: readonly Contract[], method: string, path: string): Problem {
  const methods = contractsAt(contracts, path).map((contract) => contract.method)
  if (methods.length === 0 || methods.some((known) => known === method)) return new Problem("not-found")
  return new Problem("method-not-allowed", `This address takes ${methods.join(", ")}.`, [], {
    allow: methods.join(", "),
  })
}
