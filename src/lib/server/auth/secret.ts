import { createHash, randomBytes } from "node:crypto"

/** What is kept of a secret: 256 random bits need no slow hash, only one that cannot be turned back. */
export function hashOfSecret(secret: string): Buffer {
  return createHash("sha256").update(secret).digest()
}

/**
 * A new secret of 256 bits for a link or a token, in base64url, with the hash to keep.
 *
 * @param prefix readable start, such as "aq_"
 */
export function newSecret(prefix = ""): { readonly secret: string; readonly hash: Buffer } {
  const secret = prefix + randomBytes(32).toString("base64url")
  return { secret, hash: hashOfSecret(secret) }
}
