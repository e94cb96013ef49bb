import { hash, verify } from "@node-rs/argon2"

/** Argon2id with the least parameters that OWASP's password storage cheat sheet accepts: 19 MiB, two passes. */
const cost = { memoryCost: 19_456, timeCost: 2, parallelism: 1 }

/** Hash of nothing that anyone can type, so that an unknown address costs as much time as a wrong password. */
let decoy: Promise<string> | undefined

/** The hash to keep of a password, in PHC string format. */
export function hashPassword(password: string): Promise<string> {
  return hash(password.normalize("NFKC"), cost)
}

/** Whether a password fits; takes as long where there is no hash to compare with. */
export async function passwordFits(kept: string | null | undefined, password: string): Promise<boolean> {
  decoy ??= hashPassword(crypto.randomUUID())
  const fits = await verify(kept ?? (await decoy), password.normalize("NFKC"))
  return fits && kept != null
}
