export interface FormulaPart {
  readonly text: string
  readonly place: 'line' | 'subscript' | 'superscript'
}

const MARK = /([_^])(?:\{([^}]*)\}|([\p{L}\p{N}]+(?:_[\p{L}\p{N}]+)?))/u

/**
 * Splits a formula where `_` sets what follows as a subscript and `^` as a superscript: one word of letters and digits (`F_A0`, `p^a_i`),
 * or a group in braces (`r_{feed, 1}`).
 */
export function formulaParts(formula: string): FormulaPart[] {
  const parts: FormulaPart[] = []
  let rest = formula
  while (rest !== '') {
    const mark = MARK.exec(rest)
    if (!mark) {
      parts.push({ text: rest, place: 'line' })
      break
    }
    if (mark.index > 0) parts.push({ text: rest.slice(0, mark.index), place: 'line' })
    const isSubscript = mark[1] === '_'
    const word = mark[3] ?? ''
    // an index inside an exponent belongs to it (p^a_i); after a subscript, `_` starts no second one
    const text = mark[2] ?? (isSubscript ? word.replaceAll('_', ', ') : word.replaceAll('_', ''))
    parts.push({ text, place: isSubscript ? 'subscript' : 'superscript' })
    rest = rest.slice(mark.index + mark[0].length)
  }
  return parts
}
