import { versionState } from "@/components/manuscript/figure-heat"
import { HeatMark } from "@/components/parts/heat"
import { When } from "@/components/parts/when"
import type { FigureAnswer } from "@/lib/contracts/figures"

/** All versions of a figure as dated marks, newest first. */
export function VersionRail({
  figure,
  current,
  address,
}: {
  figure: FigureAnswer
  current: number | null
  address: string
}) {
  return (
    <nav aria-label="Versions" className="mb-4 overflow-x-auto border-b border-hairline">
      <ol className="m-0 flex list-none gap-6 p-0 pb-2 text-small">
        {figure.versions.map((version, index) => {
          const { heat, words } = versionState(version, index === 0)
          return (
            <li key={version.number} className="flex-none">
              <a
                href={`${address}/versions/${version.number}`}
                aria-current={version.number === current ? "page" : undefined}
                title={version.message}
                className={`inline-flex min-h-6 items-baseline gap-2 ${version.number === current ? "font-semibold no-underline" : ""}`}
              >
                v{version.number} <When at={version.createdAt} />
              </a>
              <div>
                <HeatMark heat={heat}>{words}</HeatMark>
              </div>
            </li>
          )
        })}
      </ol>
    </nav>
  )
}
