import { z } from "zod"
import { defineContract } from "./contract"

const mathBox = z.object({ w: z.number(), h: z.number(), d: z.number(), body: z.string() })

export const typesetMath = defineContract({
  id: "typesetMath",
  method: "POST",
  path: "/api/v1/typeset",
  summary: "Set formulas as paths: size in em, baseline at 0, and the body of an SVG.",
  access: { who: "signed-in", scope: "read" },
  body: z.object({ tex: z.array(z.string().max(500)).max(100) }).strict(),
  status: 200,
  answer: z.object({
    boxes: z.array(z.object({ box: mathBox.nullable(), problem: z.string().nullable() })),
  }),
  problems: ["invalid-request"],
})

export const getOpenApi = defineContract({
  id: "getOpenApi",
  method: "GET",
  path: "/api/v1/openapi.json",
  summary: "This API as an OpenAPI 3.1 document.",
  access: { who: "public" },
  status: 200,
  answer: "application/json",
})

export const openContracts = [typesetMath, getOpenApi] as const
