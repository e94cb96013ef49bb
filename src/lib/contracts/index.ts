import type { Contract } from "./contract"

/** Every endpoint of the API: what OpenAPI, the role test and the answer to a wrong method are made from. */
export const contracts: readonly Contract[] = []
