import type { AuthConfig, Session } from "@auth/core/types"
import type { APIContext } from "astro"

export interface AstroAuthOptions extends Omit<AuthConfig, "raw"> {
  readonly prefix: string
}

type Handler = (context: Pick<APIContext, "cookies" | "request">) => Promise<Response | undefined>

export function AstroAuth(options: AstroAuthOptions): { GET: Handler; POST: Handler }
export function getSession(request: Request, options: AstroAuthOptions): Promise<Session | null>
