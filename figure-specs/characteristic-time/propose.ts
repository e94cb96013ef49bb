import type { DataTable } from "../figure-kind"
import { distinctValues, proposedColumns } from "../proposal"
import { characteristicTimeParams, type CharacteristicTimeParams } from "./params"

/**
 * A panel to start from: the parameter with the most values is the control parameter, another one with few the curves.
 * Without a parameter it is the observable that takes the fewest values, because a measured time hardly repeats.
 */
export function proposeTimes(
  dataset: string,
  table: DataTable,
  roles: ReadonlyMap<string, string>,
): CharacteristicTimeParams {
  const counted = (role: string) =>
    table.columns
      .filter(({ name }) => roles.get(name) === role)
      .map(({ name }) => ({ name, count: distinctValues(table, name).length }))
      .sort((a, b) => b.count - a.count)
  const observables = counted("observable")
  const parameters = [...counted("parameter"), ...counted("coordinate")]
  const control = parameters[0] ?? (observables.length > 1 ? observables.at(-1) : undefined)
  const observable = observables.find(({ name }) => name !== control?.name)
  const other = parameters[1]
  return characteristicTimeParams.parse({
    kind: "characteristic-time",
    data: {
      dataset,
      columns: {
        ...proposedColumns(table, roles, ["trajectory", "uncertainty"]),
        ...(control ? { parameter: control.name } : {}),
        ...(observable ? { observable: observable.name } : {}),
      },
      curveBy: other && other.count > 1 && other.count <= 8 ? other.name : null,
    },
  })
}
