/** Prints one of the simulated tables as CSV: `npx tsx scripts/simulate/write-table.ts annihilation > annihilation.csv`. */
import { simulatedTables, tableCsv, type SimulationName } from "./simulated-tables"

const [name = ""] = process.argv.slice(2)
if (Object.hasOwn(simulatedTables, name)) {
  process.stdout.write(tableCsv(simulatedTables[name as SimulationName]()))
} else {
  console.error(`Name one of ${Object.keys(simulatedTables).join(", ")}.`)
  process.exitCode = 1
}
