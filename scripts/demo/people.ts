import type { Role } from "../../src/lib/domain/policy"

export interface DemoPerson {
  readonly name: string
  readonly email: string
  readonly role: Role
  /** What the person may do, for the sign-in page. */
  readonly words: string
  readonly password: string
}

const password = "slow decay, rough fronts"

/** The invented group of the demo; local mode only. */
export const demoPeople: readonly DemoPerson[] = [
  {
    name: "Ilse Brandvold",
    email: "ilse.brandvold@example.org",
    role: "corresponding-author",
    words: "corresponding author",
    password,
  },
  {
    name: "Tomasz Quillfeather",
    email: "tomasz.quillfeather@example.org",
    role: "co-author",
    words: "co-author",
    password,
  },
  {
    name: "Noor Achterberg",
    email: "noor.achterberg@example.org",
    role: "reader",
    words: "reader",
    password,
  },
]
