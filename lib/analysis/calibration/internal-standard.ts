import { AnalysisError } from '../analysis-error'

/**
 * Response of a species relative to the internal standard, from a mixture of known concentrations.
 *
 * F = (A_X/C_X)/(A_S/C_S)
 *
 * Source: Harris, Quantitative Chemical Analysis, 8th edition, section 5-4.
 *
 * @param analyte - area [counts] > 0 and concentration [any] > 0
 * @param standard - area [counts] > 0 and concentration, in the same unit [any] > 0
 * @returns relative response factor [-]
 * @throws {AnalysisError} not-positive
 * @example areas 423 and 347 for 0.0837 and 0.0666 mol/L: 0.9699730408
 */
export function internalStandardFactor(analyte: AreaAndConcentration, standard: AreaAndConcentration): number {
  for (const value of [analyte.area, analyte.concentration, standard.area, standard.concentration])
    if (!(value > 0)) throw new AnalysisError('not-positive', 'Areas and concentrations must be above zero.', { value })
  return analyte.area / analyte.concentration / (standard.area / standard.concentration)
}

/** A peak and what made it. */
export interface AreaAndConcentration {
  readonly area: number
  readonly concentration: number
}

/**
 * Concentration of a species in the injected mixture, by the internal standard in the same mixture.
 *
 * C_X = C_S (A_X/A_S)/F, both in the mixture as injected; then undo the dilution
 *
 * Source: Harris, Quantitative Chemical Analysis, 8th edition, section 5-4.
 *
 * @param analyteArea - area of the species [counts] >= 0
 * @param standard - area [counts] > 0 and concentration in the injected mixture [any] > 0
 * @param factor - relative response factor [-] > 0
 * @returns concentration in the injected mixture [unit of the standard's concentration]
 * @throws {AnalysisError} not-positive
 */
export function concentrationByInternalStandard(
  analyteArea: number,
  standard: AreaAndConcentration,
  factor: number,
): number {
  if (!(analyteArea >= 0) || !(standard.area > 0) || !(standard.concentration > 0) || !(factor > 0))
    throw new AnalysisError('not-positive', 'The standard and the factor must be above zero.', { analyteArea, factor })
  return (standard.concentration * analyteArea) / standard.area / factor
}

/**
 * Response factor from a sensitivity, or a sensitivity from a factor: the two are reciprocals, and files mix them.
 *
 * f = 1/s
 *
 * Source: definition.
 *
 * @param value - amount per area, or area per amount [any] > 0
 * @returns the other one [any]
 * @throws {AnalysisError} not-positive
 */
export function reciprocalResponse(value: number): number {
  if (!(value > 0)) throw new AnalysisError('not-positive', 'A response must be above zero.', { value })
  return 1 / value
}

/**
 * Fractions by area normalisation.
 *
 * x_i = (A_i/s_i)/Σ(A_j/s_j)
 *
 * Only where every species elutes and is seen by the detector; never to claim a balance, which it forces to one.
 * Source: common practice.
 *
 * @param peaks - area [counts] >= 0 and sensitivity [counts per amount] > 0 of every species
 * @returns fractions in the order given [-]
 * @throws {AnalysisError} not-positive when a sensitivity or the sum is not above zero
 */
export function normaliseAreas(peaks: readonly { readonly area: number; readonly sensitivity: number }[]): number[] {
  const amounts = peaks.map(({ area, sensitivity }) => {
    if (!(sensitivity > 0) || !(area >= 0))
      throw new AnalysisError('not-positive', 'Sensitivities must be above zero and areas not below.')
    return area / sensitivity
  })
  const total = amounts.reduce((sum, amount) => sum + amount, 0)
  if (!(total > 0)) throw new AnalysisError('not-positive', 'There is no area to normalise.')
  return amounts.map((amount) => amount / total)
}
