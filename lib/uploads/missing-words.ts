const MISSING = new Set([
  '',
  '-',
  '--',
  '---',
  '----',
  '-----',
  '–',
  '—',
  '*',
  '**',
  '***',
  '****',
  '?',
  'nan',
  'n/a',
  'na',
  'n.a.',
  'null',
  'none',
  'nil',
  'missing',
  'fehlt',
  'k.a.',
  'n.b.',
  'err',
  'error',
  'bad',
  'fault',
  'fehler',
  '#n/a',
  '#n/a n/a',
  '#na',
  '#div/0!',
  '#value!',
  '#wert!',
  '#ref!',
  '#bezug!',
  '#num!',
  '#zahl!',
  '#name?',
  '#null!',
  '1.#qnan',
  '1.#ind',
  '-1.#ind',
])
const OVER_RANGE = new Set([
  'over',
  'ovr',
  'overrange',
  'over range',
  'ovld',
  'ovl',
  'overload',
  'inf',
  '+inf',
  '-inf',
  'infinity',
  '1.#inf',
  'open',
  'under',
  'underrange',
])
const CENSORED = new Set([
  'n.d.',
  'n.d',
  'nd',
  'n. d.',
  'not detected',
  'none detected',
  'n.n.',
  'nn',
  'nicht nachweisbar',
  'nicht nachgewiesen',
  'bdl',
  'b.d.l.',
  'bd',
  'b.d.',
  'bql',
  'blq',
  'lod',
  'loq',
  'u.n.g.',
  'ung',
  'trace',
  'traces',
  'tr',
  'tr.',
  'spur',
  'spuren',
  'non détecté',
  'no detectado',
])

/** Loggers write it where a sensor gives nothing; no quantity that is read here can have it. Source: common practice. */
export const MISSING_NUMBER = -9_999

export type Absence = 'missing' | 'over-range' | 'censored'

/** How a cell says that there is no number in it: a marker for a missing value, for an overflow, or for less than can be told; null otherwise. */
export function absenceOf(text: string): Absence | null {
  if (text.length > 40) return null
  const word = text.trim().toLowerCase()
  if (MISSING.has(word)) return 'missing'
  // `< LOD`, `<0.01`, `≤ 5`
  const first = word.charCodeAt(0)
  if (first === 0x3c || first === 0x2264) return 'censored'
  if (CENSORED.has(word)) return 'censored'
  if (OVER_RANGE.has(word)) return 'over-range'
  if (/^[-\u2212]9999([.,]0+)?$/.test(word)) return 'missing'
  return null
}

/** The number behind `<`, as text; null where the limit has only a name. */
export function censoringLimit(text: string): string | null {
  const rest = text
    .trim()
    .replace(/^[<≤]=?/, '')
    .trim()
  return rest !== '' && rest.charCodeAt(0) >= 48 && rest.charCodeAt(0) <= 57 ? rest : null
}
