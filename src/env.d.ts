/// <reference types="astro/client" />

declare namespace App {
  interface Locals {
    /** Names this request in logs and in problem documents. */
    requestId: string
    /** Address of the client; server.mjs decides which proxies to believe. */
    clientAddress: string
    /** Who is signed in with this browser. */
    actor: import("@/lib/server/auth/actor").Actor | null
  }
}
