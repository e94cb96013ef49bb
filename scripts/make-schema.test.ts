import { readFileSync } from "node:fs"
import { expect, test } from "vitest"
import { figureSchemaText, schemaFile } from "./make-schema"

test("the published schema is the one in code; if not: npx tsx scripts/make-schema.ts", () => {
  expect(readFileSync(schemaFile, "utf8")).toBe(figureSchemaText())
})
