export interface FormulaPart {
  readonly text: string
  readonly isSubscript: boolean
}

/** Splits a formula where `_` sets what follows as a subscript: one word of letters and digits (`F_A0`), or a group in braces (`r_{feed, 1}`). */
export function formulaParts(formula: string): FormulaPart[] {
  const parts: FormulaPart[] = []
  let rest = formula
  while (rest !== '') {
    const mark = /_(?:\{([^}]*)\}|([\p{L}\p{N}]+))/u.exec(rest)
    if (!mark) {
      parts.push({ text: rest, isSubscript: false })
      break
    }
    if (mark.index > 0) parts.push({ text: rest.slice(0, mark.index), isSubscript: false })
    parts.push({ text: mark[1] ?? mark[2] ?? '', isSubscript: true })
    rest = rest.slice(mark.index + mark[0].length)
  }
  return parts
}
