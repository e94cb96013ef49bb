import { Problem } from "@/lib/contracts/problems"

/** What a service returns, or undefined where it says `not-found`: pages answer that with their own page. */
export async function found<T>(asked: Promise<T>): Promise<T | undefined> {
  try {
    return await asked
  } catch (error) {
    if (error instanceof Problem && error.code === "not-found") return undefined
    throw error
  }
}
