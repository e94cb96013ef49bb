import { authOptions } from "./src/lib/server/auth/auth-options"

/** What auth-astro uses where it is given no options of its own; our routes give theirs, for each request. */
export default authOptions()
