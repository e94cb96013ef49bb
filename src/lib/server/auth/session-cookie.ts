const cookieName = /^(__Secure-)?authjs\.session-token(\.\d+)?$/

/** Whether a cookie carries a session, or a part of one. */
export function isSessionCookie(name: string): boolean {
  return cookieName.test(name)
}

/** Names of the session cookies that a request carries; empty for strangers and for clients with tokens. */
export function sessionCookiesOf(request: Request): readonly string[] {
  return (request.headers.get("cookie") ?? "")
    .split(";")
    .map((pair) => pair.split("=")[0]?.trim() ?? "")
    .filter(isSessionCookie)
}

/** `Set-Cookie` that makes a browser forget a cookie of ours. */
export function forgetCookie(name: string): string {
  return `${name}=; Path=/; Max-Age=0; HttpOnly; SameSite=Lax${name.startsWith("__Secure-") ? "; Secure" : ""}`
}
