import { accountContracts } from "./accounts"
import type { Contract } from "./contract"
import { manuscriptContracts } from "./manuscripts"
import { peopleContracts } from "./people"

/** Every endpoint of the API: what OpenAPI, the role test and the answer to a wrong method are made from. */
export const contracts: readonly Contract[] = [
  ...accountContracts,
  ...manuscriptContracts,
  ...peopleContracts,
]
