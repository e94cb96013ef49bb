import http from "node:http"
import type { AddressInfo } from "node:net"
import Provider from "oidc-provider"

/** What the provider says of the person who signs in next. */
export interface Claims {
  readonly sub: string
  readonly name?: string
  readonly email?: string
  readonly email_verified?: boolean
}

export const client = { id: "afterquench", secret: "a secret of the test" }

/**
 * An OpenID Connect provider without a face: it signs in whoever `signsIn` names, asking nothing. It has its address
 * before it knows where it may send people back to, because the application wants that address when it starts.
 */
export async function startIdentityProvider() {
  const server = http.createServer()
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve))
  const issuer = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
  let person: Claims = { sub: "nobody" }
  const serve = (redirectUri: string) => {
    const provider = new Provider(issuer, {
      clients: [{ client_id: client.id, client_secret: client.secret, redirect_uris: [redirectUri] }],
      claims: { openid: ["sub"], email: ["email", "email_verified"], profile: ["name"] },
      findAccount: (_, sub) => ({ accountId: sub, claims: () => ({ ...person, sub }) }),
      features: { devInteractions: { enabled: false } },
      cookies: { keys: ["keys of the test"] },
      interactions: { url: (_, interaction) => `/interaction/${interaction.uid}` },
    })
    const answer = provider.callback()
    server.on("request", (request, response) => {
      if (request.url?.startsWith("/interaction/")) void finish(request, response)
      else void answer(request, response)
    })
    async function finish(request: http.IncomingMessage, response: http.ServerResponse): Promise<void> {
      const { prompt, params, session } = await provider.interactionDetails(request, response)
      if (prompt.name === "login")
        return provider.interactionFinished(request, response, { login: { accountId: person.sub } })
      const grant = new provider.Grant({
        accountId: session?.accountId ?? person.sub,
        clientId: String(params.client_id),
      })
      grant.addOIDCScope(String(params.scope))
      await provider.interactionFinished(request, response, { consent: { grantId: await grant.save() } })
    }
  }
  return {
    issuer,
    /** Begins to answer, for one address to send people back to. */
    serve,
    signsIn: (claims: Claims) => {
      person = claims
    },
    stop: () => {
      server.closeAllConnections()
      server.close()
    },
  }
}
