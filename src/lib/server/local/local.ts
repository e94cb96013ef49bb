import { env } from "@/lib/server/env"
import { startIdentityProvider } from "./identity-provider"
import { startMailServer } from "./mail-server"

/** The program that stands in for a group's mail server and identity provider; see scripts/start.mjs. */
const { LOCAL_MAIL_PORT, LOCAL_OIDC_PORT } = process.env
const { MAIL_DIRECTORY, OIDC_CLIENT_ID, OIDC_CLIENT_SECRET, PUBLIC_URL } = env()
const stops: (() => Promise<void>)[] = []
if (LOCAL_MAIL_PORT && MAIL_DIRECTORY)
  stops.push(await startMailServer(Number(LOCAL_MAIL_PORT), MAIL_DIRECTORY))
if (LOCAL_OIDC_PORT && OIDC_CLIENT_ID && OIDC_CLIENT_SECRET)
  stops.push(
    await startIdentityProvider({
      port: Number(LOCAL_OIDC_PORT),
      clientId: OIDC_CLIENT_ID,
      clientSecret: OIDC_CLIENT_SECRET,
      redirectUri: `${PUBLIC_URL}/api/auth/callback/oidc`,
    }),
  )
process.send?.({ type: "ready" })

async function stop(): Promise<void> {
  await Promise.all(stops.map((end) => end()))
  process.exit(0)
}
process
  .on("SIGTERM", () => void stop())
  .on("SIGINT", () => void stop())
  .on("disconnect", () => void stop())
