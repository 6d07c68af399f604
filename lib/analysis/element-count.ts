import { AnalysisError } from './analysis-error'

const PART = /([A-Z][a-z]?)(\d*)|\(|\)(\d*)/y

/**
 * Atoms of each element in a molecular formula.
 *
 * Reads element symbols with counts and one level of brackets: `C2H5OH`, `Ni(CO)4`. Isomers marked by text are not told apart.
 * Source: common practice.
 *
 * @param formula - molecular formula [-]
 * @returns element symbol → number of atoms [-]
 * @throws {AnalysisError} unknown-species when the text is not a formula
 */
export function elementCount(formula: string): Readonly<Record<string, number>> {
  const refuse = () => new AnalysisError('unknown-species', `"${formula}" is not a molecular formula`, { formula })
  const counts: Record<string, number> = {}
  let group: Record<string, number> | null = null
  let at = 0
  while (at < formula.length) {
    PART.lastIndex = at
    const found = PART.exec(formula)
    if (found === null) throw refuse()
    at = PART.lastIndex
    const element = found[1]
    if (element !== undefined) {
      const target: Record<string, number> = group ?? counts
      target[element] = (target[element] ?? 0) + (found[2] === '' ? 1 : Number(found[2]))
    } else if (found[0] === '(') {
      if (group !== null) throw refuse()
      group = {}
    } else {
      if (group === null) throw refuse()
      const times = found[3] === '' || found[3] === undefined ? 1 : Number(found[3])
      for (const [symbol, count] of Object.entries(group)) counts[symbol] = (counts[symbol] ?? 0) + count * times
      group = null
    }
  }
  if (group !== null || at === 0) throw refuse()
  return counts
}
