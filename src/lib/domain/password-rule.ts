export const minPasswordLength = 15
export const maxPasswordLength = 200

/**
 * Pieces that common passwords are made of. A password of 15 and more characters is guessed early when it is nothing
 * but such pieces in a row; from memory of published lists of leaked passwords.
 */
const commonPieces =
  `password passwort passphrase passw0rd p@ssword p@ssw0rd letmein welcome admin administrator root user
  guest login master secret changeme default iloveyou loveyou love qwertyuiop qwerty qwertz azerty asdfghjkl asdfgh asdf
  zxcvbnm zxcvbn zxcv qazwsxedc qazwsx 1qaz2wsx 1q2w3e4r5t 1q2w3e4r 1q2w3e q1w2e3r4 abcdefghijklmnopqrstuvwxyz abcdefgh
  abcdef abcd abc xyz 1234567890 123456789 12345678 1234567 123456 12345 1234 123 0987654321 987654321 87654321 654321
  4321 321 monkey dragon football baseball basketball superman batman starwars princess sunshine shadow michael jordan
  ashley charlie donald computer internet samsung google facebook freedom whatever trustno1 hello world test testing
  summer winter spring autumn january february march april may june july august september october november december
  monday friday correcthorsebatterystaple correct horse battery staple afterquench quench physics science university
  manuscript figure my the is this your and one two for new`
    .split(/\s+/)
    .sort((a, b) => b.length - a.length)

const leet: Readonly<Record<string, string>> = { "0": "o", "1": "i", "3": "e", "4": "a", "5": "s", "7": "t" }

/** Whether a text is nothing but the given pieces, digits and signs in a row. */
function isMadeOf(text: string, pieces: readonly string[]): boolean {
  const reachable = new Uint8Array(text.length + 1)
  reachable[0] = 1
  for (let at = 0; at < text.length; at++) {
    if (reachable[at] !== 1) continue
    if (!/\p{L}/u.test(text[at] ?? "")) reachable[at + 1] = 1
    for (const piece of pieces) if (text.startsWith(piece, at)) reachable[at + piece.length] = 1
  }
  return reachable[text.length] === 1
}

/** Whether a text is one short piece over and over: "abcabcabcabcabc". */
function isRepeated(text: string): boolean {
  for (let period = 1; period <= Math.min(6, text.length / 2); period++)
    if ([...text].every((character, at) => at < period || character === text[at - period])) return true
  return false
}

/**
 * What is wrong with a password, as a sentence, or null. Long and not guessable is all that is asked; there are no rules
 * of composition.
 *
 * @param known texts that belong to the person: name, e-mail address
 * @see NIST SP 800-63B-4, section 3.1.1.2
 */
export function passwordIssue(password: string, known: readonly string[] = []): string | null {
  const text = password.normalize("NFKC").toLowerCase()
  if ([...password].length < minPasswordLength)
    return `A password has at least ${minPasswordLength} characters; a sentence is easy to remember.`
  if (password.length > maxPasswordLength) return `A password has at most ${maxPasswordLength} characters.`
  if (isRepeated(text)) return "This password repeats one short piece and is guessed early."
  const own = known
    .flatMap((each) => each.toLowerCase().split(/[^\p{L}\d]+/u))
    .filter((piece) => piece.length >= 3)
  const pieces = [...commonPieces, ...own]
  const plain = text.replace(/[013457]/g, (digit) => leet[digit] ?? digit)
  if (isMadeOf(text, pieces) || isMadeOf(plain, pieces))
    return "This password is made of common words, keys in a row or your own name, and is guessed early."
  return null
}
