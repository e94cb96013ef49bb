import { describe, expect, test } from "vitest"
import { bytesSource } from "../source/byte-source"
import { readTable } from "../read-table"

const roles = async (header: string, rows: readonly (readonly (number | string)[])[]) => {
  const text = [header, ...rows.map((row) => row.join(","))].join("\n")
  const { columns, problems } = await readTable(bytesSource("a.csv", Buffer.from(text)))
  return { roles: columns.map(({ name, role }) => `${name}:${role}`), problems }
}
const grid = (runs: number, times: number, row: (run: number, time: number) => (number | string)[]) =>
  Array.from({ length: runs * times }, (_, index) => row(Math.floor(index / times), index % times))
/** An observable that never repeats. */
const signal = (run: number, time: number) => (run * 31 + time * 7.5) / 8

// Rules: docs/intake.md, Header, rule 7.
describe("roles", () => {
  test("of an ensemble with parameters", async () => {
    const found = await roles(
      "run,t,n,n_err,gamma",
      grid(6, 8, (run, t) => [run, t, signal(run, t), 0.1 + t / 64, run < 3 ? 0.1 : 0.2]),
    )
    expect(found.roles).toEqual([
      "run:trajectory",
      "t:time",
      "n:observable",
      "n_err:uncertainty",
      "gamma:parameter",
    ])
    expect(found.problems).toEqual([])
  })
  test("of curves told apart by a parameter alone", async () => {
    const found = await roles(
      "gamma,t,n",
      grid(3, 8, (curve, t) => [0.1 * (curve + 1), t, signal(curve, t)]),
    )
    expect(found.roles).toEqual(["gamma:parameter", "t:time", "n:observable"])
    expect(found.problems).toEqual([])
  })
  test("of runs that are used again under another parameter", async () => {
    const found = await roles(
      "gamma,run,t,n",
      grid(6, 5, (curve, t) => [curve < 3 ? 0.1 : 0.2, curve % 3, t, signal(curve, t)]),
    )
    expect(found.roles).toEqual(["gamma:parameter", "run:trajectory", "t:time", "n:observable"])
    expect(found.problems).toEqual([])
  })
  test("of trajectories named by texts or by an unnamed counter", async () => {
    const labels = await roles(
      "sample,t,n",
      grid(4, 5, (run, t) => [`s${run}`, t, signal(run, t)]),
    )
    expect(labels.roles).toEqual(["sample:trajectory", "t:time", "n:observable"])
    expect(labels.problems).toEqual([])
    const counter = await roles(
      "c,t,n",
      grid(4, 5, (run, t) => [run, t, signal(run, t)]),
    )
    expect(counter.roles).toEqual(["c:trajectory", "t:time", "n:observable"])
  })
  test("of a restart that repeats rows: time falls and nothing begins anew", async () => {
    const rows = [0, 1, 2, 3, 2, 3, 4, 5, 6, 7, 8, 9].map((t, index) => [t, signal(index, t)])
    const found = await roles("time,n", rows)
    expect(found.roles).toEqual(["time:time", "n:observable"])
    expect(found.problems).toMatchObject([{ code: "time-goes-back", line: 6, column: 1 }])
  })
  test("a column that is called tau and goes up and down is no time", async () => {
    const found = await roles(
      "gamma,tau",
      Array.from({ length: 12 }, (_, index) => [index / 8, (index * 5) % 12]),
    )
    expect(found.roles).toContain("tau:observable")
    expect(found.problems).toEqual([])
  })
  test("an error needs its base, whatever the affix", async () => {
    const found = await roles(
      "x,y,y_sem,err_x,z_err",
      Array.from({ length: 12 }, (_, i) => [i, i * 1.5, i / 9, i / 7, i / 5]),
    )
    expect(found.roles).toEqual([
      "x:coordinate",
      "y:observable",
      "y_sem:uncertainty",
      "err_x:uncertainty",
      "z_err:observable",
    ])
  })
})
