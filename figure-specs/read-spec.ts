import type { z } from "zod"
import { pointerOf } from "@/lib/domain/json-pointer"
import { figureSpec, type FigureSpec } from "./figure-spec"
import { panelParams } from "./registry"
import type { SpecIssue } from "./spec-error"

/** What would be right at a place, in words; alternatives of a union are joined by "or". */
function wanted(issue: z.core.$ZodIssue): string {
  switch (issue.code) {
    case "invalid_type":
      return (
        { tuple: "a pair", int: "a whole number", record: "an object" }[issue.expected as string] ??
        `${/^[aeiou]/.test(issue.expected) ? "an" : "a"} ${issue.expected}`
      )
    case "invalid_value":
      return issue.values.map((value) => JSON.stringify(value)).join(" or ")
    case "invalid_union":
      return issue.errors.flatMap(([first]) => (first ? [wanted(first)] : [])).join(" or ")
    default:
      return issue.message
  }
}

function messageOf(issue: z.core.$ZodIssue): string {
  if (issue.code === "custom") return issue.message
  if (issue.code === "invalid_union" && issue.discriminator !== undefined)
    return `There is no such ${issue.discriminator}; there are ${panelParams.options.map((option) => option.shape.kind.value).join(", ")}.`
  const known = ["invalid_type", "invalid_value", "invalid_union"].includes(issue.code)
  return known ? `This has to be ${wanted(issue)}.` : `${issue.message}.`
}

/** Issues of a schema as issues of a spec: one for each unknown key, at that key. */
export function issuesOf(error: z.ZodError, base: readonly (string | number)[] = []): readonly SpecIssue[] {
  return error.issues.flatMap((issue): SpecIssue[] => {
    const at = [...base, ...issue.path.map((key) => (typeof key === "symbol" ? String(key) : key))]
    if (issue.code === "unrecognized_keys")
      return issue.keys.map((key) => ({
        pointer: pointerOf([...at, key]),
        code: "unknown-key",
        message: `There is no setting “${key}” here.`,
      }))
    const code = issue.code === "custom" ? "not-allowed" : issue.code.replaceAll("_", "-")
    return [{ pointer: pointerOf(at), code, message: messageOf(issue) }]
  })
}

/**
 * Reads a figure spec from JSON text.
 *
 * @returns the spec with its defaults filled in, or every issue with its place
 */
export function readSpec(
  text: string,
): { readonly spec: FigureSpec } | { readonly issues: readonly SpecIssue[] } {
  let json: unknown
  try {
    json = JSON.parse(text)
  } catch (error) {
    if (!(error instanceof SyntaxError)) throw error
    return {
      issues: [{ pointer: "", code: "not-json", message: `This is not JSON yet: ${error.message}` }],
    }
  }
  const read = figureSpec.safeParse(json)
  return read.success ? { spec: read.data } : { issues: issuesOf(read.error) }
}
