export interface Answered {
  readonly status: number
  /** The parsed body; an empty object for an empty answer. */
  readonly body: Record<string, unknown>
  /** Code of the problem, when it is one. */
  readonly code: string | undefined
  readonly headers: Headers
}

/** Sends JSON to the application as its own pages do, and reads the JSON that comes back. */
export async function send(
  url: string,
  method: string,
  address: string,
  { body, headers = {} }: { body?: unknown; headers?: Record<string, string> } = {},
): Promise<Answered> {
  const response = await fetch(url + address, {
    method,
    redirect: "manual",
    headers: {
      origin: new URL(url).origin,
      ...(body === undefined ? {} : { "content-type": "application/json" }),
      ...headers,
    },
    body: body === undefined ? null : JSON.stringify(body),
  })
  const text = await response.text()
  const json = response.headers.get("content-type")?.includes("json") && text !== ""
  const parsed = json ? (JSON.parse(text) as Record<string, unknown>) : {}
  const problem = response.headers.get("content-type")?.includes("problem")
  return {
    status: response.status,
    body: parsed,
    code: problem ? String(parsed.code) : undefined,
    headers: response.headers,
  }
}
