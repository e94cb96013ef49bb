import { randomStream } from "@/lib/stats/random/random-stream"

/** A raw ensemble as a group would upload it: n(t) = t^(-1/2) with noise of its own in each run and at each time. */
export function decayCsv({ runs = 24, times = 30, seed = 1 } = {}): string {
  const stream = randomStream(seed, 0)
  const lines = ["run,t [1/J],n"]
  for (let run = 1; run <= runs; run += 1) {
    const level = 1 + 0.05 * (stream.uniform() - 0.5)
    for (let step = 0; step < times; step += 1) {
      const t = 2 ** (step / 3)
      lines.push(`${run},${t},${level * t ** -0.5 * (1 + 0.1 * (stream.uniform() - 0.5))}`)
    }
  }
  return `${lines.join("\n")}\n`
}

/** A figure of that table. */
export const decaySpec = (
  changes: { dataset?: string; window?: [number, number]; quantity?: string } = {},
) => ({
  version: 1,
  title: "Decay",
  size: { widthMm: 86, heightMm: 64 },
  panels: [
    {
      kind: "decay-exponent",
      data: {
        dataset: changes.dataset ?? "runs",
        columns: { trajectory: "run", time: "t", observable: "n" },
      },
      fit: { window: changes.window ?? [4, 400] },
      quantities: [
        { name: changes.quantity ?? "alphaTest", of: "exponent", theory: { value: -0.5, label: "exact" } },
      ],
    },
  ],
})
