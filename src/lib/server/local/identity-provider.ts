import http from "node:http"
import Provider from "oidc-provider"

/** Invented people of the local identity provider. */
const people = [
  { sub: "p-1", name: "Ilse Brandvold", email: "ilse.brandvold@example.org" },
  { sub: "p-2", name: "Tomasz Quillfeather", email: "tomasz.quillfeather@example.org" },
] as const

const escaped = (text: string) =>
  text.replaceAll("&", "&amp;").replaceAll("<", "&lt;").replaceAll('"', "&quot;")

const page = (uid: string) => `<!doctype html><html lang="en"><meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1"><title>Local identity provider</title>
<body style="font:16px/1.6 serif;max-width:32rem;margin:4rem auto;padding:0 1rem">
<h1>Local identity provider</h1><p>This stands in for your institution's sign-in while the product runs on your own machine. Who are you?</p>
${people
  .map(
    (
      person,
    ) => `<form method="post" action="/interaction/${escaped(uid)}/${person.sub}" style="margin:.5rem 0">
<button style="font:inherit;padding:.4rem 1rem">${escaped(person.name)}, ${escaped(person.email)}</button></form>`,
  )
  .join("")}</body></html>`

/**
 * An OpenID Connect provider for one's own machine: the real protocol, people who need no password.
 *
 * @returns stops it
 */
export async function startIdentityProvider(options: {
  port: number
  clientId: string
  clientSecret: string
  redirectUri: string
}): Promise<() => Promise<void>> {
  const issuer = `http://127.0.0.1:${options.port}`
  const provider = new Provider(issuer, {
    clients: [
      {
        client_id: options.clientId,
        client_secret: options.clientSecret,
        redirect_uris: [options.redirectUri],
      },
    ],
    claims: { openid: ["sub"], email: ["email", "email_verified"], profile: ["name"] },
    findAccount: (_, sub) => {
      const person = people.find((candidate) => candidate.sub === sub)
      return person && { accountId: sub, claims: () => ({ ...person, email_verified: true }) }
    },
    features: { devInteractions: { enabled: false } },
    cookies: { keys: [options.clientSecret] },
    interactions: { url: (_, interaction) => `/interaction/${interaction.uid}` },
  })
  const answer = provider.callback()
  const interact = async (request: http.IncomingMessage, response: http.ServerResponse) => {
    const [, , uid = "", sub] = (request.url ?? "").split("/")
    const { prompt, params, session } = await provider.interactionDetails(request, response)
    if (prompt.name === "login") {
      if (request.method === "POST" && sub) {
        await provider.interactionFinished(request, response, { login: { accountId: sub } })
        return
      }
      response.writeHead(200, { "content-type": "text/html; charset=utf-8" }).end(page(uid))
      return
    }
    const grant = new provider.Grant({
      accountId: session?.accountId ?? "",
      clientId: String(params.client_id),
    })
    grant.addOIDCScope(String(params.scope))
    await provider.interactionFinished(request, response, { consent: { grantId: await grant.save() } })
  }
  const server = http.createServer((request, response) => {
    if (!request.url?.startsWith("/interaction/")) {
      void answer(request, response)
      return
    }
    interact(request, response).catch((error: Error) => {
      response.writeHead(400, { "content-type": "text/plain" }).end(`${error.message}\n`)
    })
  })
  await new Promise<void>((resolve, reject) => {
    server.once("error", reject)
    server.listen(options.port, "127.0.0.1", () => resolve())
  })
  return () =>
    new Promise((resolve) => {
      server.close(() => resolve())
      server.closeAllConnections()
    })
}
