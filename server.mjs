import { existsSync } from "node:fs"
import http from "node:http"
import path from "node:path"
import { fileURLToPath } from "node:url"
import send from "send"

process.env.ASTRO_NODE_AUTOSTART = "disabled"
const root = path.dirname(fileURLToPath(import.meta.url))
const client = path.join(root, "dist", "client")
const { handler } = await import("./dist/server/entry.mjs")

const host = process.env.HOST ?? "127.0.0.1"
const port = Number(process.env.PORT ?? 4321)
const publicUrl = new URL(process.env.PUBLIC_URL ?? `http://127.0.0.1:${port}`)
const trustedProxies = new Set(
  (process.env.TRUSTED_PROXIES ?? "")
    .split(",")
    .map((entry) => entry.trim())
    .filter(Boolean),
)

/** For every answer, files included; pages add their content policy to these. */
const headers = {
  "X-Content-Type-Options": "nosniff",
  "Referrer-Policy": "same-origin",
  "X-Frame-Options": "DENY",
  "Cross-Origin-Opener-Policy": "same-origin",
  "Cross-Origin-Resource-Policy": "same-origin",
  "Permissions-Policy": "camera=(), geolocation=(), microphone=(), payment=(), usb=()",
  ...(publicUrl.protocol === "https:"
    ? { "Strict-Transport-Security": "max-age=31536000; includeSubDomains" }
    : {}),
}
/** What is not a page runs and loads nothing. A page's own policy replaces this one. */
const filePolicy = "default-src 'none'; frame-ancestors 'none'; sandbox"
/** A script that runs as a worker lives under its own policy: it loads its parts and calls our API. */
const scriptPolicy = "default-src 'none'; script-src 'self'; connect-src 'self'; frame-ancestors 'none'"

/** The nearest address that is not one of the proxies we were told to believe. */
function clientAddress(request) {
  const hops = [
    ...(request.headers["x-forwarded-for"] ?? "").split(",").map((hop) => hop.trim()),
    request.socket.remoteAddress,
  ]
  let address = hops.pop()
  while (trustedProxies.has(address) && hops.at(-1)) address = hops.pop()
  return address ?? "unknown"
}

function isUtf8(pathname) {
  try {
    return typeof decodeURI(pathname) === "string"
  } catch {
    return false
  }
}

function isOdd(url) {
  const pathname = url.split("?")[0]
  return url.startsWith("//") || url.includes("\\") || /%(2f|5c|00)/i.test(pathname) || !isUtf8(pathname)
}

/** A file of the build that a path names, or undefined. */
function fileOf(pathname) {
  const file = path.join(client, path.normalize(pathname))
  return pathname !== "/" && file.startsWith(client + path.sep) && existsSync(file) ? file : undefined
}

const server = http.createServer(
  { requestTimeout: 0, headersTimeout: 20_000, keepAliveTimeout: 10_000 },
  (request, response) => {
    for (const [name, value] of Object.entries(headers)) response.setHeader(name, value)
    const url = request.url ?? "/"
    if (isOdd(url)) {
      response.writeHead(404, { "Content-Type": "text/plain; charset=utf-8" }).end("There is nothing here.\n")
      return
    }
    // On one's own machine "localhost" and "127.0.0.1" are the same place, but not for cookies.
    if (
      request.method === "GET" &&
      request.headers.host !== publicUrl.host &&
      /^localhost:/.test(request.headers.host ?? "")
    ) {
      response.writeHead(302, { Location: new URL(url, publicUrl).href }).end()
      return
    }
    const pathname = decodeURI(url.split("?")[0])
    const isRead = request.method === "GET" || request.method === "HEAD"
    if (isRead && fileOf(pathname)) {
      response.setHeader("Content-Security-Policy", pathname.endsWith(".js") ? scriptPolicy : filePolicy)
      const hashed = pathname.startsWith("/_astro/")
      send(request, pathname, { root: client, index: false, immutable: hashed, maxAge: hashed ? "1y" : "1h" })
        .on("directory", () =>
          handler(request, response, undefined, { clientAddress: clientAddress(request) }),
        )
        .pipe(response)
      return
    }
    handler(request, response, undefined, { clientAddress: clientAddress(request) })
  },
)

server.on("clientError", (_, socket) => {
  if (socket.writable) socket.end("HTTP/1.1 400 Bad Request\r\nConnection: close\r\n\r\n")
})
server.listen(port, host, () => process.send?.({ type: "listening", port }))

let stopping = false
/** Stops accepting, ends event streams, lets running requests finish for a moment, closes the database. */
async function stop() {
  if (stopping) return
  stopping = true
  // Event streams listen for this and end; the pool is closed by whoever opened it.
  const closed = new Promise((resolve) => server.close(resolve))
  process.emit("afterquench:stop")
  server.closeIdleConnections()
  const patience = setTimeout(() => server.closeAllConnections(), 5_000)
  await closed
  clearTimeout(patience)
  process.exit(0)
}
process.on("SIGTERM", stop).on("SIGINT", stop)
// Started by npm start: without its parent the server has no reason to live.
process.on("disconnect", stop)
