import { type Estimate } from './estimate'
import { totalUncertainty } from './total-uncertainty'
import { type WorkingSymbol } from './working'

/**
 * An estimate as a symbol of a working, with its whole uncertainty: shown = factor x SI value + offset, u shown = |factor| u.
 *
 * @param symbol - as in the formula
 * @param meaning - in words
 * @param estimate - the number with its parts; null where it is not known [SI]
 * @param unit - practical unit in which it is shown
 * @param factor - practical unit per SI unit
 * @param offset - zero of the practical unit, for example -273.15 for degrees Celsius
 * @returns the symbol in the practical unit; its uncertainty is null where none is known
 */
export function estimateSymbol(
  symbol: string,
  meaning: string,
  estimate: Estimate | null,
  unit: string,
  factor = 1,
  offset = 0,
): WorkingSymbol {
  const total = estimate === null ? null : totalUncertainty(estimate)
  return {
    symbol,
    meaning,
    value: estimate === null ? null : estimate.value * factor + offset,
    unit,
    standardUncertainty: total === null ? null : total.standardUncertainty * Math.abs(factor),
    uncertaintyKind: kindOf(estimate),
  }
}

/** A part below this share of the whole is none that a reader could see. */
const VISIBLE_SHARE = 0.01

function kindOf(estimate: Estimate | null): WorkingSymbol['uncertaintyKind'] {
  const total = estimate === null ? null : totalUncertainty(estimate)
  if (estimate === null || total === null || !(total.standardUncertainty > 0)) return total === null ? 'none' : 'own'
  const isShared = total.sharedStandardUncertainty > VISIBLE_SHARE * total.standardUncertainty
  const isOwn = (estimate.randomStandardUncertainty ?? 0) > VISIBLE_SHARE * total.standardUncertainty
  return isShared ? (isOwn ? 'both' : 'shared') : 'own'
}

/**
 * A number of a working that is known as it stands, or whose uncertainty is given apart.
 *
 * @param symbol - as in the formula
 * @param meaning - in words
 * @param value - in the practical unit; null where it is not known
 * @param unit - practical unit in which it is shown
 * @param standardUncertainty - in the same unit
 * @param uncertaintyKind - whether it is shared with other numbers
 * @returns the symbol
 */
export function plainSymbol(
  symbol: string,
  meaning: string,
  value: number | null,
  unit = '',
  standardUncertainty: number | null = null,
  uncertaintyKind: WorkingSymbol['uncertaintyKind'] = 'none',
): WorkingSymbol {
  return { symbol, meaning, value, unit, standardUncertainty, uncertaintyKind }
}
