import { adjustByHolm } from '../comparison/holm'
import { type Estimate } from '../estimate'
import { compareEstimates, type EstimateDifference } from './compare-estimates'

export interface NamedSlope {
  readonly name: string
  readonly activationEnergyJPerMol: Estimate
}

export interface SlopePair {
  readonly first: string
  readonly second: string
  readonly found: EstimateDifference
  /** p of this pair with all pairs of the table taken into account; null where the pair has no p */
  readonly adjustedPValue: number | null
}

/**
 * Differences of activation energy of all pairs, with p adjusted for their number.
 *
 * Each pair as `compareEstimates`; p after Holm's step-down, which keeps the chance of one false "differ" in the whole table below the
 * level without assuming that the pairs are independent. Pairs with an unknown random part are left out.
 * Source: S. Holm, Scand. J. Statist. 6 (1979) 65.
 *
 * @param slopes - names and activation energies in parts [J mol-1]
 * @param confidenceLevel - of each interval on its own, between 0 and 1 [-]
 * @returns pairs in the order of the list, first before second [J mol-1; -]
 * @throws {AnalysisError} out-of-range
 */
export function compareAllSlopes(slopes: readonly NamedSlope[], confidenceLevel: number): SlopePair[] {
  const pairs = slopes.flatMap((first, index) =>
    slopes.slice(index + 1).flatMap((second) => {
      const found = compareEstimates(first.activationEnergyJPerMol, second.activationEnergyJPerMol, confidenceLevel)
      return found === null ? [] : [{ first: first.name, second: second.name, found }]
    }),
  )
  const tested = pairs.flatMap((pair) => (pair.found.pValue === null ? [] : [pair.found.pValue]))
  const adjusted = adjustByHolm(tested)
  let next = 0
  return pairs.map((pair) => ({
    ...pair,
    adjustedPValue: pair.found.pValue === null ? null : (adjusted[next++] ?? null),
  }))
}
