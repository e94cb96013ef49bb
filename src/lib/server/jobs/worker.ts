import { Logger, parseCronItems, run } from "graphile-worker"
import { closeDb, getDb, getPool } from "@/lib/server/db/client"
import { deleteExpiredRows } from "@/lib/server/db/delete-expired-rows"
import { env } from "@/lib/server/env"
import { computeFigureJob } from "./compute-figure"
import { makeBundleJob } from "./make-bundle"
import { readTableJob } from "./read-table"
import { sendMailJob } from "./send-mail"
import { unlockAbandonedJobs } from "./unlock-abandoned-jobs"

/** Jobs that ran well are not news. */
const logger = new Logger(() => (level, message) => {
  if (level === "error" || level === "warning") console.error(`worker: ${message}`)
})

const presence = await unlockAbandonedJobs(getPool())
const runner = await run({
  pgPool: getPool(),
  concurrency: env().WORKER_CONCURRENCY,
  noHandleSignals: true,
  pollInterval: 1000,
  logger,
  taskList: {
    "read-table": readTableJob,
    "compute-figure": computeFigureJob,
    "make-bundle": makeBundleJob,
    "send-mail": sendMailJob,
    "delete-expired-rows": () => deleteExpiredRows(getDb()),
  },
  parsedCronItems: parseCronItems([{ task: "delete-expired-rows", match: "17 3 * * *" }]),
})
process.send?.({ type: "ready" })

let stopping = false
/** Lets running jobs finish, then closes the database. */
async function stop(): Promise<void> {
  if (stopping) return
  stopping = true
  await runner.stop()
  presence.release()
  await closeDb()
  process.exit(0)
}
process.on("SIGTERM", () => void stop())
process.on("SIGINT", () => void stop())
process.on("disconnect", () => void stop())
await runner.promise
