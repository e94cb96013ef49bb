import { accountContracts } from "./accounts"
import type { Contract } from "./contract"
import { datasetContracts } from "./datasets"
import { draftContracts } from "./drafts"
import { eventContracts } from "./events"
import { figureContracts } from "./figures"
import { manuscriptContracts } from "./manuscripts"
import { peopleContracts } from "./people"
import { threadContracts } from "./threads"
import { openContracts } from "./typeset"

/** Every endpoint of the API: what OpenAPI, the role test and the answer to a wrong method are made from. */
export const contracts: readonly Contract[] = [
  ...accountContracts,
  ...manuscriptContracts,
  ...peopleContracts,
  ...datasetContracts,
  ...figureContracts,
  ...threadContracts,
  ...draftContracts,
  ...eventContracts,
  ...openContracts,
]
