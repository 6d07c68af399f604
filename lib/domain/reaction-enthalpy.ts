import { AnalysisError } from '../analysis/analysis-error'
import { reactionEnthalpy } from '../analysis/equilibrium/approach-to-equilibrium'
import { type Reaction } from './reaction'

const ROOM_TEMPERATURE_K = 298.15

/**
 * Heat of the main step for each mole of key reactant that it uses up [J mol-1], at 298.15 K; null where a species has no thermochemistry, built in or
 * entered with the reaction.
 */
export function keyReactantEnthalpy(
  reaction: Pick<Reaction, 'keyReactant' | 'steps' | 'thermochemistry'>,
): number | null {
  const [main] = reaction.steps
  const used = -(main?.[reaction.keyReactant] ?? 0)
  if (main === undefined || !(used > 0)) return null
  try {
    return reactionEnthalpy(main, ROOM_TEMPERATURE_K, reaction.thermochemistry ?? {}) / used
  } catch (error) {
    if (error instanceof AnalysisError) return null
    throw error
  }
}
