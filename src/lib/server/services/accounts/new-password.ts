import { Problem } from "@/lib/contracts/problems"
import { passwordIssue } from "@/lib/domain/password-rule"

/**
 * Refuses a password that is guessed early.
 *
 * @param pointer where in the request body it stands
 * @throws Problem `invalid-request`
 */
export function refuseWeakPassword(password: string, known: readonly string[], pointer: string): void {
  const message = passwordIssue(password, known)
  if (message !== null)
    throw new Problem("invalid-request", message, [{ pointer, code: "weak_password", message }])
}
