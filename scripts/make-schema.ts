/** Writes public/schema/figure-spec.v1.json from the schema in code: `npx tsx scripts/make-schema.ts`. */
import { mkdir, writeFile } from "node:fs/promises"
import path from "node:path"
import { fileURLToPath, pathToFileURL } from "node:url"
import { z } from "zod"
import { figureSpec } from "../figure-specs/figure-spec"

export const schemaFile = fileURLToPath(new URL("../public/schema/figure-spec.v1.json", import.meta.url))

/** JSON Schema (2020-12) of a figure spec as a person writes it: what has a default may be left out. */
export function figureSchemaText(): string {
  const { $schema, ...schema } = z.toJSONSchema(figureSpec, { io: "input", target: "draft-2020-12" })
  const described = {
    $schema,
    $id: "/schema/figure-spec.v1.json",
    title: "Figure spec, version 1",
    ...schema,
  }
  return `${JSON.stringify(described, null, 2)}\n`
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? "").href) {
  await mkdir(path.dirname(schemaFile), { recursive: true })
  await writeFile(schemaFile, figureSchemaText())
}
