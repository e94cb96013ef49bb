import { skipCSRFCheck } from "@auth/core"
import Credentials from "@auth/core/providers/credentials"
import type { Provider } from "@auth/core/providers"
import type { AstroAuthOptions } from "./auth-astro.js"
import { getDb } from "@/lib/server/db/client"
import { env } from "@/lib/server/env"
import { checkCredentials } from "./check-credentials"
import { personOfIdentity } from "./person-of-identity"
import { signInDays, startSignIn } from "./sign-in-rows"

/** What the session cookie carries: the row that says whether it still holds. */
declare module "@auth/core/types" {
  interface Session {
    signInId?: string
  }
}
declare module "@auth/core/jwt" {
  interface JWT {
    signInId?: string
  }
}

const day = 24 * 60 * 60

/**
 * Options for Auth.js, for one request.
 *
 * Its own check against forged requests is off: the middleware refuses every unsafe request from another origin, so a
 * plain form and our JSON sign-in need no second token.
 *
 * @param userAgent what the browser calls itself, kept with the sign-in so that its owner recognises it
 */
export function authOptions(userAgent = ""): AstroAuthOptions {
  return {
    prefix: "/api/auth",
    basePath: "/api/auth",
    secret: env().AUTH_SECRET,
    trustHost: true,
    skipCSRFCheck,
    useSecureCookies: env().PUBLIC_URL.startsWith("https:"),
    session: { strategy: "jwt", maxAge: signInDays * day },
    pages: { signIn: "/sign-in", error: "/sign-in" },
    providers: [passwordProvider, ...openIdProviders()],
    logger: { error: logUnlessExpected },
    callbacks: {
      signIn: ({ account, profile }) =>
        account?.type !== "oidc" || (profile?.email_verified === true && Boolean(profile.email))
          ? true
          : "/sign-in?error=unverified",
      jwt: async ({ token, user, account, profile }) => {
        if (account == null) return token
        const personId =
          account.type === "oidc"
            ? await personOfIdentity(getDb(), {
                provider: env().OIDC_ISSUER ?? "",
                subject: account.providerAccountId,
                email: profile?.email ?? "",
                name: profile?.name ?? profile?.email ?? "",
              })
            : (user.id ?? "")
        const provider = account.type === "oidc" ? "oidc" : "password"
        return { signInId: await startSignIn(getDb(), personId, provider, userAgent) }
      },
      session: ({ session, token }) => ({
        expires: session.expires,
        ...(token.signInId === undefined ? {} : { signInId: token.signInId }),
      }),
    },
  }
}

/** Attempts are counted by the endpoint that calls this; Auth.js's own page for it is not reachable. */
const passwordProvider = Credentials({
  id: "password",
  credentials: { email: {}, password: {} },
  authorize: async ({ email, password }) => {
    const id = await checkCredentials(getDb(), String(email), String(password))
    return id === null ? null : { id }
  },
})

/** The group's identity provider, when the environment names one. Claims come from its userinfo endpoint. */
function openIdProviders(): Provider[] {
  const { OIDC_ISSUER, OIDC_CLIENT_ID, OIDC_CLIENT_SECRET, OIDC_NAME } = env()
  if (OIDC_ISSUER === undefined) return []
  return [
    {
      id: "oidc",
      type: "oidc",
      name: OIDC_NAME,
      issuer: OIDC_ISSUER,
      clientId: OIDC_CLIENT_ID ?? "",
      clientSecret: OIDC_CLIENT_SECRET ?? "",
      idToken: false,
      checks: ["pkce", "state", "nonce"],
      authorization: { params: { scope: "openid email profile" } },
    },
  ]
}

/** A wrong password is no fault of ours. */
function logUnlessExpected(error: Error): void {
  if (error.name !== "CredentialsSignin") console.error("sign-in failed:", error)
}
