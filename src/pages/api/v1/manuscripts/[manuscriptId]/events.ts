import { followEvents as contract } from "@/lib/contracts/events"
import { endpoint } from "@/lib/server/http/endpoint"
import { eventStream } from "@/lib/server/services/history/live-events"

export const GET = endpoint(contract, async ({ actor, params, request }) => {
  const seen = request.headers.get("last-event-id")
  const lastId = seen !== null && /^\d{1,15}$/.test(seen) ? Number(seen) : null
  const stream = await eventStream(params.manuscriptId, actor, lastId, request.signal)
  return new Response(stream, {
    headers: { "content-type": "text/event-stream", "cache-control": "no-store", "x-accel-buffering": "no" },
  })
})
