// In JavaScript, with its types beside it: the package is TypeScript source that does not pass our compiler.
export { AstroAuth, getSession } from "auth-astro/server"
