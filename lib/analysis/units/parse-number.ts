/** How a file or a person separates the decimals; null where it has not been said. */
export type DecimalMark = '.' | ',' | null

/** A number as read, or why it was not. */
export type NumberReading =
  { readonly ok: true; readonly value: number } | { readonly ok: false; readonly sentence: string }

const DASHES = /[\u2010\u2011\u2012\u2013\u2212\ufe63\uff0d]/gu
const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹'

/**
 * Number behind the ways people and instruments write one: decimal comma or point, thousands set apart by space, apostrophe, point or
 * comma, Unicode minus, exponents E, D and ×10ⁿ.
 *
 * A single comma before exactly three digits (`1,234`) can be a decimal mark or a thousands mark; unless the caller knows which, it is
 * refused and not guessed. A single point is a decimal point.
 * Source: common practice; RFC 4180 files and instrument exports.
 *
 * @param text - the number as written [-], without its unit
 * @param decimalMark - the decimal mark, where it is known [-]
 * @returns the value [-] in the unit as written, or a sentence that says what is wrong and what to write
 * @example `1.234,5` is 1234.5; `7,2` is 7.2; `1,2 × 10⁻⁵` is 0.000012
 */
export function parseNumber(text: string, decimalMark: DecimalMark = null): NumberReading {
  const plain = text
    .trim()
    .replace(DASHES, '-')
    .replace(/^\+/, '')
    .replace(
      /\s*[×x·*⋅]\s*10\s*\^?\s*([-+]?[\d⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺]+)$/u,
      (_whole, exponent: string) => `E${plainExponent(exponent)}`,
    )
  const match = /^(-?)([\d.,'’\s\u00a0\u2007\u2009\u202f]*\d[.,]?)(?:[eEdD]([-+]?\d{1,3}))?$/u.exec(plain)
  const sign = match?.[1]
  const body = match?.[2]
  if (sign === undefined || body === undefined) return refuse(text, 'is not a number')
  const digits = digitsOf(body, decimalMark)
  if (!digits.ok) return { ok: false, sentence: `“${text.trim()}” ${digits.sentence}` }
  const exponent = match?.[3]
  const value = Number(`${sign}${digits.plain}${exponent === undefined ? '' : `e${exponent}`}`)
  return Number.isFinite(value) ? { ok: true, value } : refuse(text, 'is too large to be a measured number')
}

type Digits = { readonly ok: true; readonly plain: string } | { readonly ok: false; readonly sentence: string }

// The mantissa with its thousands marks taken out and a decimal point.
function digitsOf(body: string, decimalMark: DecimalMark): Digits {
  const spaced = ungroup(body, /['’\s\u00a0\u2007\u2009\u202f]/gu)
  if (spaced === null) return { ok: false, sentence: 'has spaces where no thousands can be; write it without spaces' }
  const commas = count(spaced, ',')
  const points = count(spaced, '.')
  if (commas === 0 && points === 0) return { ok: true, plain: spaced }
  const mark = decimalMark ?? guessMark(spaced, commas, points)
  if (mark === null) {
    const asDecimal = spaced.replace(',', '.')
    const asThousands = spaced.replace(',', '')
    return { ok: false, sentence: `can mean ${asDecimal} or ${asThousands}; write one of these` }
  }
  const thousands = mark === '.' ? ',' : '.'
  if (count(spaced, mark) > 1) return { ok: false, sentence: 'has more than one decimal mark; write it with one' }
  const [whole = '', part = ''] = spaced.split(mark)
  if (part.includes(thousands))
    return { ok: false, sentence: 'has a thousands mark behind the decimal mark; write it without thousands marks' }
  const plainWhole = ungroup(whole, thousands === ',' ? /,/g : /\./g)
  if (plainWhole === null)
    return { ok: false, sentence: 'has digit groups that are not of three; write it without thousands marks' }
  return { ok: true, plain: `${plainWhole === '' ? '0' : plainWhole}.${part === '' ? '0' : part}` }
}

function guessMark(body: string, commas: number, points: number): DecimalMark {
  // with both marks the last one is the decimal mark; a mark that repeats is a thousands mark
  if (commas > 0 && points > 0) return body.lastIndexOf(',') > body.lastIndexOf('.') ? ',' : '.'
  if (commas > 1) return '.'
  if (points > 1) return ','
  if (points === 1) return '.'
  return /^[1-9]\d{0,2},\d{3}$/.test(body) ? null : ','
}

// Takes group marks out when the groups are of three digits, as thousands are; null when they are not.
function ungroup(digits: string, mark: RegExp): string | null {
  const groups = digits.trim().split(mark)
  const first = groups[0]
  if (first === undefined || groups.length === 1) return digits.trim()
  if (first.length === 0 || first.length > 3) return null
  const middle = groups.slice(1, -1)
  const last = groups[groups.length - 1] ?? ''
  return middle.every((group) => group.length === 3) && /^\d{3}([.,]\d*)?(?:[.,]\d+)*$/.test(last)
    ? groups.join('')
    : null
}

function plainExponent(text: string): string {
  return [...text]
    .map((letter) =>
      letter === '⁻'
        ? '-'
        : letter === '⁺'
          ? '+'
          : SUPERSCRIPTS.includes(letter)
            ? String(SUPERSCRIPTS.indexOf(letter))
            : letter,
    )
    .join('')
}

function count(text: string, mark: string): number {
  return text.split(mark).length - 1
}

function refuse(text: string, what: string): NumberReading {
  const shown = text.trim()
  return {
    ok: false,
    sentence: shown === '' ? 'Nothing is written; write a number.' : `“${shown}” ${what}; write it like 7.2 or 7,2.`,
  }
}
