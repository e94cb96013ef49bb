import type { ExpressionBuilder } from "kysely"
import type { DB } from "@/lib/server/db/types"

/** Whether a newer accepted version exists of the dataset of `datasetVersion` in a query. */
export const newerVersionExists = (eb: ExpressionBuilder<DB, "datasetVersion">) =>
  eb
    .exists(
      eb
        .selectFrom("datasetVersion as newer")
        .select("newer.id")
        .whereRef("newer.datasetId", "=", "datasetVersion.datasetId")
        .whereRef("newer.number", ">", "datasetVersion.number")
        .where("newer.state", "=", "accepted"),
    )
    .$castTo<boolean>()
