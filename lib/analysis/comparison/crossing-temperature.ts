import { type CompensationLine } from './compensation'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'

/**
 * Temperature at which two Arrhenius lines cross, above and below which the order of two catalysts differs.
 *
 * T_x = (Ea₁ − Ea₂) / (R (ln A₁ − ln A₂))
 *
 * Both ln A in the same unit and of the same order. Means something only within the measured range.
 * Source: algebra of the Arrhenius equation.
 *
 * @param first - Ea [J mol-1] and ln A [-] of one line
 * @param second - Ea [J mol-1] and ln A [-] of the other
 * @returns crossing temperature [K]; null for lines that do not cross at a positive temperature
 */
export function crossingTemperature(first: CompensationLine, second: CompensationLine): number | null {
  const temperature =
    (first.activationEnergyJPerMol - second.activationEnergyJPerMol) /
    (GAS_CONSTANT_J_PER_MOL_K * (first.lnPreExponential - second.lnPreExponential))
  return Number.isFinite(temperature) && temperature > 0 ? temperature : null
}
