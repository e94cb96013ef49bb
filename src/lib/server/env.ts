import { z } from "zod"

const port = z.coerce.number().int().min(1).max(65535)
const flag = z.enum(["0", "1", "true", "false"]).transform((text) => text === "1" || text === "true")
const address = z.url()

/**
 * The whole environment, read in this one place; docs/operations.md explains each variable. `npm start` fills in what
 * is missing for a machine of its own.
 */
const environment = z
  .object({
    /** PostgreSQL as the application role. */
    DATABASE_URL: z.string().min(1),
    /** Where people reach the product; decides cookies, links in mails and the origin check. */
    PUBLIC_URL: address.transform((url) => url.replace(/\/$/, "")),
    HOST: z.string().default("127.0.0.1"),
    PORT: port.default(4321),
    /** Signs the session tokens. */
    AUTH_SECRET: z.string().min(32),
    /** Mail goes here; without it in local mode to MAIL_DIRECTORY through the local mail server. */
    SMTP_URL: z.string().optional(),
    MAIL_FROM: z.string().default("Afterquench <afterquench@localhost>"),
    /** Local mode only: where the local mail server keeps what it received. */
    MAIL_DIRECTORY: z.string().optional(),
    OIDC_ISSUER: address.optional(),
    OIDC_CLIENT_ID: z.string().optional(),
    OIDC_CLIENT_SECRET: z.string().optional(),
    OIDC_NAME: z.string().default("your institution"),
    /** Addresses of proxies whose X-Forwarded-For is believed, separated by commas. */
    TRUSTED_PROXIES: z
      .string()
      .default("")
      .transform((list) =>
        list
          .split(",")
          .map((entry) => entry.trim())
          .filter(Boolean),
      ),
    /** The product runs for one person on their own machine: demo accounts on the sign-in page, a page of local mail. */
    LOCAL_MODE: flag.default(false),
    /** Whether people may open an account without an invitation. */
    OPEN_REGISTRATION: flag.default(true),
    WORKER_CONCURRENCY: z.coerce.number().int().min(1).max(32).default(2),
  })
  .refine((env) => env.OIDC_ISSUER === undefined || (env.OIDC_CLIENT_ID && env.OIDC_CLIENT_SECRET), {
    message: "OIDC_ISSUER needs OIDC_CLIENT_ID and OIDC_CLIENT_SECRET.",
    path: ["OIDC_CLIENT_ID"],
  })

export type Environment = z.output<typeof environment>

let read: Environment | undefined

/**
 * The validated environment.
 *
 * @throws Error naming every variable that is missing or wrong
 */
export function env(): Environment {
  if (read) return read
  const parsed = environment.safeParse(process.env)
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `  ${issue.path.join(".")}: ${issue.message}`)
    throw new Error(`The environment is not complete (see docs/operations.md):\n${lines.join("\n")}`)
  }
  read = parsed.data
  return read
}
