/** Messages of the set-up go to standard error, so that a command's own output stays clean. */
export const say = (text) => process.stderr.write(`${text}\n`)

/** Ends a set-up step that cannot go on: what happened and what to do. */
export class SetUpError extends Error {}

/** Runs a script's main function; a SetUpError is a message, anything else a bug with its stack. */
export async function run(main) {
  try {
    await main()
  } catch (error) {
    say(error instanceof SetUpError ? `\n${error.message}` : error.stack)
    process.exitCode = 1
  }
}
