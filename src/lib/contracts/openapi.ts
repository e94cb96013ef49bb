import { z } from "zod"
import type { Contract } from "./contract"
import { problems, type ProblemCode } from "./problems"

const jsonSchema = (schema: z.ZodType, io: "input" | "output") =>
  z.toJSONSchema(schema, { target: "draft-2020-12", io, unrepresentable: "any" })

/** The named properties of an object schema as parameters of a path or query. */
function parametersOf(schema: z.ZodType, place: "path" | "query") {
  const { properties = {}, required = [] } = jsonSchema(schema, "input") as {
    properties?: Record<string, object>
    required?: string[]
  }
  return Object.entries(properties).map(([name, type]) => ({
    name,
    in: place,
    required: place === "path" || required.includes(name),
    schema: type,
  }))
}

/** What a call has to carry, in words. */
function accessWords({ access }: Contract): string {
  switch (access.who) {
    case "public":
      return "Anyone."
    case "signed-in":
      return access.scope === null
        ? "Anyone signed in with a browser."
        : `Anyone signed in; a token needs the scope ${access.scope}.`
    case "member":
      return `Members whose role allows ${access.action}; for others the address does not exist.`
  }
}

function answerOf(contract: Contract) {
  const { answer, headers = {} } = contract
  const described = Object.fromEntries(
    Object.entries(headers).map(([name, description]) => [name, { description, schema: { type: "string" } }]),
  )
  const content =
    answer === null
      ? {}
      : typeof answer === "string"
        ? { content: { [answer]: {} } }
        : { content: { "application/json": { schema: jsonSchema(answer, "output") } } }
  return { description: "Done.", ...(headers ? { headers: described } : {}), ...content }
}

const always: readonly ProblemCode[] = ["not-signed-in", "not-allowed", "not-found"]

function operationOf(contract: Contract) {
  const codes = [...new Set([...(contract.access.who === "public" ? [] : always), ...contract.problems])]
  const byStatus = new Map<number, ProblemCode[]>()
  for (const code of codes)
    byStatus.set(problems[code].status, [...(byStatus.get(problems[code].status) ?? []), code])
  return {
    operationId: contract.id,
    summary: contract.summary,
    description: accessWords(contract),
    ...(contract.access.who === "public" ? { security: [] } : {}),
    parameters: [...parametersOf(contract.params, "path"), ...parametersOf(contract.query, "query")],
    ...(contract.body === null
      ? {}
      : {
          requestBody: {
            required: true,
            content:
              contract.body === "stream"
                ? { "application/octet-stream": {} }
                : { "application/json": { schema: jsonSchema(contract.body, "input") } },
          },
        }),
    responses: {
      [contract.status]: answerOf(contract),
      ...Object.fromEntries(
        [...byStatus].map(([status, group]) => [
          status,
          {
            description: group.map((code) => `${code}: ${problems[code].title}.`).join(" "),
            content: { "application/problem+json": { schema: { $ref: "#/components/schemas/Problem" } } },
          },
        ]),
      ),
    },
  }
}

/** The API as an OpenAPI 3.1 document, made from its contracts. */
export function openApi(contracts: readonly Contract[], serverUrl: string) {
  const paths: Record<string, Record<string, object>> = {}
  for (const contract of contracts)
    (paths[contract.path] ??= {})[contract.method.toLowerCase()] = operationOf(contract)
  const place = {
    type: "object",
    properties: { pointer: { type: "string" }, code: { type: "string" }, message: { type: "string" } },
  }
  return {
    openapi: "3.1.0",
    info: { title: "Afterquench", version: "1", license: { name: "MIT", identifier: "MIT" } },
    servers: [{ url: serverUrl }],
    security: [{ token: [] }, { session: [] }],
    paths,
    components: {
      securitySchemes: {
        token: { type: "http", scheme: "bearer" },
        session: { type: "apiKey", in: "cookie", name: "authjs.session-token" },
      },
      schemas: {
        Problem: {
          type: "object",
          description: "RFC 9457 problem details.",
          required: ["type", "title", "status", "code", "detail", "action"],
          properties: {
            type: { type: "string" },
            title: { type: "string" },
            status: { type: "integer" },
            code: { type: "string", enum: Object.keys(problems) },
            detail: { type: "string" },
            action: { type: "string" },
            requestId: { type: "string" },
            errors: { type: "array", items: place },
          },
        },
      },
    },
  }
}
