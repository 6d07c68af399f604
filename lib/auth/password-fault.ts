/** Long enough that neither composition rules nor regular changes are needed. */
export const MINIMUM_PASSWORD_CHARACTERS = 15
/** No truncation: longer input is refused, not cut. */
export const MAXIMUM_PASSWORD_BYTES = 1024
/** What has to be left of a password once common words, names and runs are taken away: letters, or different other characters. */
const MINIMUM_OWN_CHARACTERS = 6
const MINIMUM_OTHER_CHARACTERS = 7

/** Parts that turn up first in every list of guessed passwords, and the words of this trade and product. */
const COMMON_PARTS = [
  ...[
    'password',
    'passwort',
    'passphrase',
    'passw',
    'pass',
    'kennwort',
    'contrasena',
    'motdepasse',
    'geheim',
    'secret',
  ],
  ...['welcome', 'willkommen', 'bienvenue', 'hello', 'letmein', 'iloveyou', 'love', 'admin', 'administrator', 'root'],
  ...['login', 'signin', 'user', 'guest', 'test', 'demo', 'default', 'changeme', 'change', 'temp', 'master', 'access'],
  ...['qwerty', 'qwertz', 'azerty', 'monkey', 'dragon', 'sunshine', 'princess', 'football', 'baseball', 'superman'],
  ...['batman', 'shadow', 'michael', 'jordan', 'charlie', 'freedom', 'whatever', 'trustno', 'starwars', 'computer'],
  ...['summer', 'winter', 'spring', 'autumn', 'january', 'february', 'march', 'april', 'june', 'july', 'august'],
  ...['september', 'october', 'november', 'december', 'monday', 'tuesday', 'wednesday', 'thursday', 'friday'],
  ...['saturday', 'sunday', 'company', 'internet', 'server', 'system', 'windows', 'google', 'facebook', 'apple'],
  ...['inversekelvin', 'inverse', 'kelvin', 'catalyst', 'catalysis', 'katalysator', 'reactor', 'laboratory'],
  ...['laboratorium', 'lab', 'campaign', 'arrhenius', 'methanation', 'technician', 'researcher', 'lead', 'sample'],
  ...['this', 'that', 'is', 'my', 'the', 'and', 'for', 'our', 'new', 'old'],
].sort((a, b) => b.length - a.length)

const RUNS = [
  'abcdefghijklmnopqrstuvwxyz',
  'zyxwvutsrqponmlkjihgfedcba',
  '01234567890123456789',
  '98765432109876543210',
  'qwertyuiopasdfghjklzxcvbnm',
  'qwertzuiopasdfghjklyxcvbnm',
  'azertyuiopqsdfghjklmwxcvbn',
  'asdfghjkl',
  'zxcvbnm',
]

const LOOKALIKES: Readonly<Record<string, string>> = {
  '0': 'o',
  '1': 'i',
  '3': 'e',
  '4': 'a',
  '5': 's',
  '7': 't',
  '@': 'a',
  $: 's',
}

/** Takes pieces of four or more characters out that lie in a known run: `1234`, `qwert`. */
function withoutRuns(text: string): string {
  let rest = ''
  let at = 0
  while (at < text.length) {
    let longest = 0
    for (const run of RUNS)
      for (let length = 4; at + length <= text.length && run.includes(text.slice(at, at + length)); length += 1)
        longest = Math.max(longest, length)
    if (longest > 0) {
      rest += ' '
      at += longest
    } else {
      rest += text[at] ?? ''
      at += 1
    }
  }
  return rest
}

/** Whether the text is one piece said over and over: `abcabcabcabcabc`. */
function isRepeated(text: string): boolean {
  for (let period = 1; period <= text.length / 2; period += 1) {
    let repeats = true
    for (let at = period; at < text.length && repeats; at += 1) repeats = text[at] === text[at - period]
    if (repeats) return true
  }
  return false
}

function withoutParts(text: string, parts: readonly string[]): string {
  return parts.reduce((rest, part) => rest.replaceAll(part, ' '), text)
}

/** Names out of the person's own details, three letters or more each. */
function ownParts(person: { readonly email: string; readonly displayName: string }): string[] {
  return `${person.email} ${person.displayName}`
    .toLowerCase()
    .split(/[^\p{L}\p{N}]+/u)
    .filter((part) => part.length >= 3)
    .sort((a, b) => b.length - a.length)
}

/**
 * Why a new password is not accepted, as a sentence that says what to do; null if it is. Length is what counts: there
 * are no rules about kinds of characters.
 */
export function passwordFault(
  password: string,
  person: { readonly email: string; readonly displayName: string },
): string | null {
  const text = password.normalize('NFC')
  const count = [...text].length
  if (count < MINIMUM_PASSWORD_CHARACTERS)
    return `This password has ${count} characters; at least ${MINIMUM_PASSWORD_CHARACTERS} are needed.`
  if (new TextEncoder().encode(text).length > MAXIMUM_PASSWORD_BYTES)
    return `This password is longer than ${MAXIMUM_PASSWORD_BYTES} bytes. Shorten it; it is never cut off silently.`
  const lower = text.normalize('NFKC').toLowerCase()
  if (isRepeated(lower) || new Set(lower).size < 5)
    return 'This password repeats itself and would be guessed at once. Choose words that do not belong together.'
  const parts = [...ownParts(person), ...COMMON_PARTS]
  const plain = withoutParts(withoutRuns(lower), parts)
  const read = withoutParts(
    withoutRuns([...lower].map((character) => LOOKALIKES[character] ?? character).join('')),
    parts,
  )
  const left = Math.min(...[plain, read].map((rest) => [...rest.matchAll(/\p{L}/gu)].length))
  const others = new Set([...plain.matchAll(/[^\p{L}\s]/gu)].map(([character]) => character))
  // Random characters carry their own weight; a year and exclamation marks behind a common word do not.
  if (left < MINIMUM_OWN_CHARACTERS && others.size < MINIMUM_OTHER_CHARACTERS)
    return 'This password is made of common words, your name or the product’s. Add words of your own that do not belong together.'
  return null
}
