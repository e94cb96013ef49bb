import { describe, expect, test } from "vitest"
import { figureSpec } from "../../figure-specs/figure-spec"
import { demoContent } from "./demo-content"
import { demoPeople } from "./people"

describe("the demo", () => {
  const versions = demoContent.figures.flatMap((figure) =>
    figure.versions.map((version) => [`${figure.name}: ${version.message}`, version.spec] as const),
  )
  test.each(versions)("%s is a valid spec on the demo's own tables", (_, spec) => {
    const names = demoContent.datasets.map(({ name }) => name)
    for (const panel of figureSpec.parse(spec).panels) expect(names).toContain(panel.data.dataset)
  })

  test("people, versions and pins that are spoken of exist", () => {
    for (const { versions: all, threads, pinned } of demoContent.figures) {
      const by = [...all, ...threads.flatMap(({ comments }) => comments)].map((entry) => entry.by)
      expect(Math.max(...by)).toBeLessThan(demoPeople.length)
      expect(pinned ?? 1).toBeLessThanOrEqual(all.length)
      for (const { on } of threads) expect(on).toBeLessThanOrEqual(all.length)
    }
  })
})
