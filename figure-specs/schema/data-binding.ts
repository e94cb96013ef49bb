import { z } from "zod"

/** Roles that a column can play in a panel; product.md's word list. */
export const columnRole = z.enum([
  "trajectory",
  "time",
  "observable",
  "uncertainty",
  "parameter",
  "coordinate",
  "weight",
])
export type ColumnRole = z.infer<typeof columnRole>

const columnName = z.string().min(1).max(200)

/** Keeps the rows in which a column has one value, one of several values, or lies in a closed range. */
export const rowFilter = z
  .object({
    column: columnName,
    equals: z.union([z.number(), z.string()]).optional(),
    oneOf: z
      .array(z.union([z.number(), z.string()]))
      .min(1)
      .max(100)
      .optional(),
    range: z.tuple([z.number().nullable(), z.number().nullable()]).optional(),
  })
  .strict()
  .refine(
    (filter) => [filter.equals, filter.oneOf, filter.range].filter((x) => x !== undefined).length === 1,
    {
      message: "A filter says exactly one of equals, oneOf or range.",
    },
  )
export type RowFilter = z.infer<typeof rowFilter>

/** Which table of the manuscript a panel reads and which column plays which role. */
export const dataBinding = z
  .object({
    dataset: z.string().min(1).max(100),
    columns: z.partialRecord(columnRole, columnName),
    where: z.array(rowFilter).max(20).default([]),
    curveBy: columnName.nullable().default(null),
  })
  .strict()
export type DataBinding = z.infer<typeof dataBinding>
