import type { Migration } from "kysely"
import * as people from "./2026-12-01-1-people"
import * as manuscripts from "./2026-12-01-2-manuscripts"
import * as data from "./2026-12-01-3-data"
import * as figures from "./2026-12-01-4-figures"
import * as review from "./2026-12-01-5-review"
import * as submission from "./2026-12-01-6-submission"
import * as record from "./2026-12-01-7-record"
import * as guards from "./2026-12-01-8-guards"
import * as draftRecord from "./2026-12-02-1-draft-record"

/** In order of their names; imported by hand so that a bundled program carries them. */
export const migrations: Record<string, Migration> = {
  "2026-12-01-1-people": people,
  "2026-12-01-2-manuscripts": manuscripts,
  "2026-12-01-3-data": data,
  "2026-12-01-4-figures": figures,
  "2026-12-01-5-review": review,
  "2026-12-01-6-submission": submission,
  "2026-12-01-7-record": record,
  "2026-12-01-8-guards": guards,
  "2026-12-02-1-draft-record": draftRecord,
}
