/** The text is a number with a decimal point. */
export const WITH_POINT = 1
/** The text is a number with a decimal comma. */
export const WITH_COMMA = 2
/** The text holds a point or a comma at all, so that it says something about the marks of its file. */
export const HAS_MARK = 4
/** More than digits, one mark and a plain exponent: must be rewritten before the engine can read it. */
const NEEDS_REWRITING = 8

const MINUS = 0x2212

function isGroupSpace(code: number): boolean {
  return code === 0x20 || code === 0xa0 || code === 0x202f || code === 0x2009 || code === 0x27 || code === 0x2019
}

/**
 * Which decimal marks make the text a number: {@link WITH_POINT}, {@link WITH_COMMA}, both or none (0).
 * `1,234` is a number either way, `1.5` only with a point: a column, not a cell, tells which it is.
 */
export function numberShape(text: string): number {
  let i = 0
  let end = text.length
  while (i < end && (text.charCodeAt(i) === 0x20 || text.charCodeAt(i) === 9 || text.charCodeAt(i) === 0xa0)) i++
  while (
    end > i &&
    (text.charCodeAt(end - 1) === 0x20 || text.charCodeAt(end - 1) === 9 || text.charCodeAt(end - 1) === 0xa0)
  )
    end--
  if (i === end || end - i > 64) return 0
  let flags = i > 0 || end < text.length ? NEEDS_REWRITING : 0
  const first = text.charCodeAt(i)
  if (first === 0x2d || first === 0x2b) i++
  else if (first === MINUS) {
    flags |= NEEDS_REWRITING
    i++
  }

  let digits = 0
  let points = 0
  let commas = 0
  let lastMark = 0
  // digits since the last mark or group space, and whether every group after the first has had three
  let group = 0
  let spaces = 0
  let groupedWell = true
  let firstGroup = -1
  let afterSpaceMark = false
  for (; i < end; i++) {
    const code = text.charCodeAt(i)
    if (code >= 48 && code <= 57) {
      digits++
      group++
    } else if (code === 0x2e || code === 0x2c) {
      if (firstGroup < 0) firstGroup = group
      else if (group !== 3) groupedWell = false
      if (code === 0x2e) points++
      else commas++
      // the mark that ends a number grouped by spaces is its decimal mark
      if (spaces > 0) afterSpaceMark = true
      lastMark = code
      group = 0
    } else if (isGroupSpace(code)) {
      if (points + commas > 0) return 0
      if (firstGroup < 0) firstGroup = group
      else if (group !== 3) groupedWell = false
      spaces++
      group = 0
    } else break
  }
  if (digits === 0) return 0
  const lastGroup = group
  if (i < end) {
    // exponent
    const letter = text.charCodeAt(i) | 0x20
    if (letter !== 0x65 && letter !== 0x64) return 0
    if (letter === 0x64) flags |= NEEDS_REWRITING
    i++
    const sign = text.charCodeAt(i)
    if (sign === MINUS) flags |= NEEDS_REWRITING
    if (sign === 0x2d || sign === 0x2b || sign === MINUS) i++
    const from = i
    while (i < end && text.charCodeAt(i) >= 48 && text.charCodeAt(i) <= 57) i++
    if (i !== end || i === from || i - from > 4) return 0
  }

  const marks = points + commas
  if (marks === 0 && spaces === 0) return flags | WITH_POINT | WITH_COMMA
  if (spaces > 0) {
    // groups of three set apart by spaces or apostrophes; at most one decimal mark after them
    if (firstGroup < 1 || firstGroup > 3 || !groupedWell || marks > 1) return 0
    if (!afterSpaceMark && lastGroup !== 3) return 0
    if (marks === 0) return flags | NEEDS_REWRITING | WITH_POINT | WITH_COMMA
    return flags | NEEDS_REWRITING | HAS_MARK | (points === 1 ? WITH_POINT : WITH_COMMA)
  }
  const grouped = firstGroup >= 1 && firstGroup <= 3 && groupedWell
  if (marks === 1) {
    const asDecimal = points === 1 ? WITH_POINT : WITH_COMMA
    const asGroups = points === 1 ? WITH_COMMA : WITH_POINT
    // an exponent never follows thousands marks in practice, and `0,123` is no group
    const canGroup = grouped && lastGroup === 3 && i === end && text.charCodeAt(firstDigit(text)) !== 48
    return flags | HAS_MARK | asDecimal | (canGroup && !hasExponent(text) ? asGroups : 0)
  }
  if (points > 0 && commas > 0) {
    // the last mark is the decimal one and stands once
    if (!grouped) return 0
    if (lastMark === 0x2e && points === 1) return flags | NEEDS_REWRITING | HAS_MARK | WITH_POINT
    if (lastMark === 0x2c && commas === 1) return flags | NEEDS_REWRITING | HAS_MARK | WITH_COMMA
    return 0
  }
  // several marks of one kind: thousands
  if (!grouped || lastGroup !== 3) return 0
  return flags | NEEDS_REWRITING | HAS_MARK | (points > 0 ? WITH_COMMA : WITH_POINT)
}

function firstDigit(text: string): number {
  let i = 0
  while (i < text.length && (text.charCodeAt(i) < 48 || text.charCodeAt(i) > 57)) i++
  return i
}

function hasExponent(text: string): boolean {
  for (let i = 0; i < text.length; i++) {
    const letter = text.charCodeAt(i) | 0x20
    if (letter === 0x65 || letter === 0x64) return true
  }
  return false
}

/**
 * The double nearest to the decimal text under the file's decimal mark, or null where the text is no number under it.
 * The engine's own conversion rounds correctly, so the text is only rewritten to its grammar.
 */
export function readNumberText(text: string, decimalMark: '.' | ','): number | null {
  const shape = numberShape(text)
  if (decimalMark === '.') {
    if ((shape & WITH_POINT) === 0) return null
    // digits, at most one point, plain exponent: `1,234` under a point needs its comma taken out
    if ((shape & NEEDS_REWRITING) === 0 && text.indexOf(',') < 0) return finite(Number(text))
  } else {
    if ((shape & WITH_COMMA) === 0) return null
    if ((shape & NEEDS_REWRITING) === 0 && text.indexOf('.') < 0) return finite(Number(text.replace(',', '.')))
  }
  let plain = ''
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i)
    if ((code >= 48 && code <= 57) || code === 0x2b || code === 0x2d) plain += text.charAt(i)
    else if (code === MINUS) plain += '-'
    else if (text.charAt(i) === decimalMark) plain += '.'
    else {
      const letter = code | 0x20
      if (letter === 0x65 || letter === 0x64) plain += 'e'
    }
  }
  return finite(Number(plain))
}

function finite(value: number): number | null {
  return Number.isFinite(value) ? value : null
}
