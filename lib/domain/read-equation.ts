import { AnalysisError } from '../analysis/analysis-error'
import { elementCount } from '../analysis/element-count'
import { speciesText } from './species-text'

export type EquationReading =
  | {
      readonly ok: true
      /** positive for what is made */
      readonly stoichiometry: Readonly<Record<string, number>>
      readonly said: string
    }
  | { readonly ok: false; readonly sentence: string }

const TERM = /^(\d+(?:[.,]\d+)?(?:\/\d+)?)?\s*([A-Za-z][A-Za-z0-9()+-]{0,19})$/

/** Stoichiometric numbers behind an equation as chemists write it: `CO2 + 4 H2 = CH4 + 2 H2O`. Atoms that do not balance are named. */
export function readEquation(text: string): EquationReading {
  const sides = text.split(/\s*(?:=>?|->|→|⇌|<=>)\s*/u)
  const [left, right] = sides
  if (left === undefined || right === undefined || sides.length !== 2)
    return { ok: false, sentence: `“${text.trim()}” needs two sides, for example CO2 + 4 H2 = CH4 + 2 H2O.` }
  const stoichiometry: Record<string, number> = {}
  const atoms: Record<string, number> = {}
  for (const [side, sign] of [
    [left, -1],
    [right, 1],
  ] as const) {
    for (const term of side.split(/\s+\+\s+|\s*\+\s*(?=[A-Z\d])/u)) {
      const match = TERM.exec(term.trim())
      const species = match?.[2]
      if (species === undefined)
        return { ok: false, sentence: `“${term.trim()}” is not a number and a formula, such as 2 H2O.` }
      const number = numberOf(match?.[1])
      if (!(number > 0)) return { ok: false, sentence: `The number before ${species} must be above zero.` }
      stoichiometry[species] = (stoichiometry[species] ?? 0) + sign * number
      try {
        for (const [element, count] of Object.entries(elementCount(species)))
          atoms[element] = (atoms[element] ?? 0) + sign * number * count
      } catch (error) {
        if (!(error instanceof AnalysisError)) throw error
        return { ok: false, sentence: `“${species}” is not a formula of elements, such as CH4.` }
      }
    }
  }
  const uneven = Object.entries(atoms).filter(([, count]) => Math.abs(count) > 1e-9)
  if (uneven.length > 0)
    return {
      ok: false,
      sentence: `Not balanced: ${uneven.map(([element, count]) => `${Math.abs(count)} ${element} too ${count > 0 ? 'many' : 'few'} on the right`).join(', ')}.`,
    }
  const kept = Object.fromEntries(Object.entries(stoichiometry).filter(([, number]) => number !== 0))
  return { ok: true, stoichiometry: kept, said: `${equationText(kept)}, balanced` }
}

/** `1/2`, `0,5`, nothing for one. */
function numberOf(text: string | undefined): number {
  if (text === undefined || text === '') return 1
  const [top, bottom] = text.replace(',', '.').split('/')
  return Number(top) / (bottom === undefined ? 1 : Number(bottom))
}

/** Stoichiometric numbers as an equation, set with subscripts. */
export function equationText(stoichiometry: Readonly<Record<string, number>>): string {
  return equation(stoichiometry, speciesText)
}

/** The same as somebody would type it. */
export function typedEquation(stoichiometry: Readonly<Record<string, number>>): string {
  return equation(stoichiometry, (species) => species)
}

function equation(stoichiometry: Readonly<Record<string, number>>, write: (species: string) => string): string {
  const side = (sign: number) =>
    Object.entries(stoichiometry)
      .filter(([, number]) => number * sign > 0)
      .map(([species, number]) =>
        Math.abs(number) === 1 ? write(species) : `${String(Math.abs(number))} ${write(species)}`,
      )
      .join(' + ')
  return `${side(-1)} = ${side(1)}`
}
